//! The forms of values: what stands after a label's colon, read in the form that the label asks for.
//!
//! All spans are relative to the start of the text given.

use pest::error::{ErrorVariant, InputLocation};
use pest::iterators::Pair;

use super::line::unquoted;
use super::parser::{Rule, parse};
use super::{LONGEST_LINE, Span};

/// A value that is not in the form asked for.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct ValueFault {
    /// Where reading stopped.
    pub at: Span,
    /// What would have been right there, in words.
    pub expected: String,
}

/// A number as it was written.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Number {
    /// Where it stands.
    pub span: Span,
    /// Its value; meaningless where `comma` is set.
    pub value: f64,
    /// Digits after the decimal point.
    pub decimals: u8,
    /// Whether a comma stands in it, so that it has two readings.
    pub comma: bool,
}

/// A number and the words of its unit.
#[derive(Clone, Debug, PartialEq)]
pub struct Amount {
    /// The number.
    pub number: Number,
    /// The words after it: the unit and what belongs to it.
    pub unit: Vec<Span>,
    /// All of it.
    pub span: Span,
}

/// A bound before a quantity.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bound {
    /// `at least`.
    Least,
    /// `at most`.
    Greatest,
}

/// How two amounts of a quantity hang together.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Joint {
    /// `-25 to 40 degC`.
    Range,
    /// `1 050 + 170 kV`.
    Sum,
}

/// What follows a quantity.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tail {
    /// `for 1 s`.
    For,
    /// `at 110 kV`.
    At,
    /// `+- 3 %`.
    Tolerance,
}

/// A quantity as it was written.
#[derive(Clone, Debug, PartialEq)]
pub struct Quantity {
    /// All of it, brackets left out.
    pub span: Span,
    /// A bound before it.
    pub bound: Option<Bound>,
    /// Whether `+-` stands before it.
    pub plus_minus: bool,
    /// The first amount.
    pub first: Amount,
    /// A second one.
    pub second: Option<(Joint, Amount)>,
    /// What follows.
    pub tails: Vec<(Tail, Amount)>,
    /// The same said again in brackets.
    pub brackets: Vec<Quantity>,
}

/// A step of an operating sequence.
#[derive(Clone, Debug, PartialEq)]
pub enum Step {
    /// `O`, `C` or `CO`, in capitals.
    Operation(String, Span),
    /// A pause in figures; the unit may be missing.
    Pause(Amount),
    /// A pause written as a letter, such as `t'`.
    Symbol(Span),
}

/// One gas of a mixture.
#[derive(Clone, Debug, PartialEq)]
pub struct Portion {
    /// The formula or the name.
    pub formula: String,
    /// Where that stands.
    pub span: Span,
    /// Its share in percent, if it is stated.
    pub share: Option<Number>,
}

/// A date, to the month or to the day.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Date {
    /// The year.
    pub year: u16,
    /// The month, as written.
    pub month: u8,
    /// The day, as written.
    pub day: Option<u8>,
}

/// One item of a list or of alternatives.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Item {
    /// The text, without quotes.
    pub text: String,
    /// Where it stands, with its quotes.
    pub span: Span,
    /// Whether it stood in quotes.
    pub quoted: bool,
}

/// Reads a quantity: `at least 40 kA`, `-25 to 40 degC`, `0.70 MPa abs at 25 degC (101 psig)`.
pub fn quantity(text: &str) -> Result<Quantity, ValueFault> {
    let mut whole: Option<Quantity> = None;
    for pair in inner(Rule::quantity_value, text)? {
        match (pair.as_rule(), &mut whole) {
            (Rule::quantity, None) => whole = read_quantity(pair),
            (Rule::bracket, Some(first)) => {
                let said_again = pair.into_inner().find(|p| p.as_rule() == Rule::quantity).and_then(read_quantity);
                first.brackets.extend(said_again);
            }
            _ => {}
        }
    }
    whole.ok_or_else(|| nothing(text))
}

/// Reads an operating sequence: `O - 0.3 s - CO - 3 min - CO`.
pub fn sequence(text: &str) -> Result<Vec<Step>, ValueFault> {
    Ok(inner(Rule::sequence_value, text)?.filter(|p| p.as_rule() == Rule::step).filter_map(read_step).collect())
}

/// Reads gases: each alternative as its portions.
pub fn gases(text: &str) -> Result<Vec<Vec<Portion>>, ValueFault> {
    let gases = inner(Rule::gas_value, text)?.filter(|p| p.as_rule() == Rule::gas);
    Ok(gases
        .map(|gas| gas.into_inner().filter(|p| p.as_rule() == Rule::portion).filter_map(read_portion).collect())
        .collect())
}

/// Reads a date: `2029-09` or `2029-09-30`. Whether there is such a day is not asked here.
pub fn date(text: &str) -> Result<Date, ValueFault> {
    let mut date = Date { year: 0, month: 0, day: None };
    for part in inner(Rule::date_value, text)? {
        match part.as_rule() {
            Rule::year => date.year = part.as_str().parse().unwrap_or(0),
            Rule::month => date.month = part.as_str().parse().unwrap_or(0),
            Rule::day => date.day = part.as_str().parse().ok(),
            _ => {}
        }
    }
    Ok(date)
}

/// Reads alternatives joined by `or`.
pub fn options(text: &str) -> Result<Vec<Item>, ValueFault> {
    items(Rule::options_value, Rule::option, text)
}

/// Reads a list with commas.
pub fn list(text: &str) -> Result<Vec<Item>, ValueFault> {
    items(Rule::list_value, Rule::item, text)
}

fn items(entry: Rule, each: Rule, text: &str) -> Result<Vec<Item>, ValueFault> {
    let items = inner(entry, text)?.filter(|p| p.as_rule() == each);
    Ok(items
        .map(|p| Item {
            text: unquoted(p.as_str()).to_owned(),
            span: p.as_span().into(),
            quoted: p.as_str().starts_with('"'),
        })
        .collect())
}

fn inner(entry: Rule, text: &str) -> Result<impl Iterator<Item = Pair<'_, Rule>>, ValueFault> {
    if text.len() > LONGEST_LINE * 4 {
        return Err(ValueFault { at: Span::new(0, text.len() as u32), expected: "a shorter text".to_owned() });
    }
    match parse(entry, text) {
        Ok(pairs) => Ok(pairs.flat_map(Pair::into_inner)),
        Err(error) => Err(fault(&error, text)),
    }
}

fn nothing(text: &str) -> ValueFault {
    ValueFault { at: Span::new(0, text.len() as u32), expected: "a value".to_owned() }
}

fn fault(error: &pest::error::Error<Rule>, text: &str) -> ValueFault {
    let start = match error.location {
        InputLocation::Pos(at) => at,
        InputLocation::Span((start, _)) => start,
    };
    let rest = text.get(start..).unwrap_or("");
    let word = rest.split_whitespace().next().map_or(0, |w| rest.find(w).unwrap_or(0) + w.len());
    let mut words: Vec<&str> = match &error.variant {
        ErrorVariant::ParsingError { positives, .. } => positives.iter().filter_map(|rule| word_for(*rule)).collect(),
        ErrorVariant::CustomError { .. } => Vec::new(),
    };
    words.sort_unstable();
    words.dedup();
    let expected = if words.is_empty() { "a value".to_owned() } else { words.join(", or ") };
    ValueFault { at: Span::new(start as u32, (start + word) as u32), expected }
}

fn word_for(rule: Rule) -> Option<&'static str> {
    Some(match rule {
        Rule::number | Rule::plain_number | Rule::comma_number | Rule::pause_number | Rule::amount => "a number",
        Rule::unit | Rule::unit_word | Rule::pause_unit => "a unit",
        Rule::range_sign => "to and a second number",
        Rule::bound | Rule::quantity => "a number with its unit",
        Rule::close_bracket => "a closing bracket",
        Rule::for_word => "for and a time",
        Rule::at_word => "at and a value",
        Rule::operation | Rule::step => "O, C or CO",
        Rule::step_dash => "a hyphen",
        Rule::pause => "a pause such as 0.3 s",
        Rule::formula | Rule::gas | Rule::portion => "the formula of a gas",
        Rule::percent => "a percent sign",
        Rule::year => "a year of four digits",
        Rule::month => "a month of two digits",
        Rule::day => "a day of two digits",
        Rule::date_dash => "a hyphen and the month",
        Rule::comma => "a comma",
        Rule::item | Rule::option | Rule::quoted => "words, or a text in quotes",
        Rule::EOI => "the end of the value",
        _ => return None,
    })
}

fn read_quantity(pair: Pair<'_, Rule>) -> Option<Quantity> {
    let span = pair.as_span().into();
    let (mut bound, mut plus_minus, mut first, mut second, mut tails) = (None, false, None, None, Vec::new());
    for part in pair.into_inner() {
        match part.as_rule() {
            Rule::plus_minus => plus_minus = true,
            Rule::bound => {
                bound = part.into_inner().next().map(|word| match word.as_rule() {
                    Rule::least_word => Bound::Least,
                    _ => Bound::Greatest,
                });
            }
            Rule::amount => first = read_amount(part),
            Rule::range => second = amount_in(part).map(|amount| (Joint::Range, amount)),
            Rule::sum => second = amount_in(part).map(|amount| (Joint::Sum, amount)),
            Rule::for_tail => tails.extend(amount_in(part).map(|amount| (Tail::For, amount))),
            Rule::at_tail => tails.extend(amount_in(part).map(|amount| (Tail::At, amount))),
            Rule::tolerance => tails.extend(amount_in(part).map(|amount| (Tail::Tolerance, amount))),
            _ => {}
        }
    }
    Some(Quantity { span, bound, plus_minus, first: first?, second, tails, brackets: Vec::new() })
}

fn amount_in(pair: Pair<'_, Rule>) -> Option<Amount> {
    pair.into_inner().find(|p| p.as_rule() == Rule::amount).and_then(read_amount)
}

fn read_amount(pair: Pair<'_, Rule>) -> Option<Amount> {
    let span = pair.as_span().into();
    let (mut number, mut unit) = (None, Vec::new());
    for part in pair.into_inner() {
        match part.as_rule() {
            Rule::number => number = Some(read_number(&part)),
            Rule::unit => unit = part.into_inner().map(|word| word.as_span().into()).collect(),
            _ => {}
        }
    }
    Some(Amount { number: number?, unit, span })
}

fn read_number(pair: &Pair<'_, Rule>) -> Number {
    let text = pair.as_str();
    let comma = text.contains(',');
    let plain: String =
        text.chars().filter(|c| !c.is_whitespace()).map(|c| if matches!(c, '−' | '–') { '-' } else { c }).collect();
    let mantissa = plain.split(['e', 'E']).next().unwrap_or("");
    let decimals = mantissa.split_once('.').map_or(0, |(_, fraction)| fraction.len().min(20) as u8);
    Number { span: pair.as_span().into(), value: plain.parse().unwrap_or(f64::NAN), decimals, comma }
}

fn read_step(pair: Pair<'_, Rule>) -> Option<Step> {
    let span = pair.as_span().into();
    let part = pair.into_inner().next()?;
    if part.as_rule() == Rule::operation {
        return Some(Step::Operation(part.as_str().to_ascii_uppercase(), span));
    }
    let (mut number, mut unit) = (None, Vec::new());
    for part in part.into_inner() {
        match part.as_rule() {
            Rule::pause_number => number = Some(read_number(&part)),
            Rule::pause_unit => unit.push(part.as_span().into()),
            _ => return Some(Step::Symbol(span)),
        }
    }
    Some(Step::Pause(Amount { number: number?, unit, span }))
}

fn read_portion(pair: Pair<'_, Rule>) -> Option<Portion> {
    let (mut formula, mut share) = (None, None);
    for part in pair.into_inner() {
        match part.as_rule() {
            Rule::formula => formula = Some((part.as_str().to_owned(), part.as_span().into())),
            Rule::share | Rule::share_first => {
                share = part
                    .into_inner()
                    .find(|p| matches!(p.as_rule(), Rule::number | Rule::plain_number))
                    .map(|number| read_number(&number));
            }
            _ => {}
        }
    }
    let (formula, span) = formula?;
    Some(Portion { formula, span, share })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn number(text: &str) -> f64 {
        quantity(text).expect(text).first.number.value
    }

    fn units(text: &str) -> Vec<&str> {
        quantity(text).expect(text).first.unit.iter().map(|span| span.of(text)).collect()
    }

    #[test]
    fn numbers_in_all_their_forms() {
        assert_eq!(number("145 kV"), 145.0);
        assert_eq!(number("1 425 kV"), 1425.0);
        assert_eq!(number("1 234 567"), 1_234_567.0);
        assert_eq!(number("-42 degC"), -42.0);
        assert_eq!(number("−42 °C"), -42.0);
        assert_eq!(number("2.5e3 A"), 2500.0);
        assert_eq!(number("0.70 MPa abs"), 0.7);
        assert_eq!(number("1\u{a0}425\u{202f}kV"), 1425.0);
        assert_eq!(quantity("0.70 MPa").expect("decimals").first.number.decimals, 2);
    }

    #[test]
    fn a_comma_is_seen_and_not_read() {
        for text in ["1,350 A", "31,5 kA", "1.350,5 A", "1,234,567 A"] {
            assert!(quantity(text).expect(text).first.number.comma, "{text}");
        }
        assert!(!quantity("1 350 A").expect("plain").first.number.comma);
    }

    #[test]
    fn the_words_of_a_unit() {
        assert_eq!(units("0.70 MPa abs"), ["MPa", "abs"]);
        assert_eq!(units("45ms"), ["ms"]);
        assert_eq!(units("6.4 bar(g)"), ["bar(g)"]);
        assert_eq!(units("31 mm/kV phase-to-phase"), ["mm/kV", "phase-to-phase"]);
        assert_eq!(units("0.5 % a year"), ["%", "a", "year"]);
        assert_eq!(units("5 kg/cm2 gauge"), ["kg/cm2", "gauge"]);
        assert_eq!(units("1.3"), [""; 0]);
    }

    #[test]
    fn bounds_ranges_and_sums() {
        assert_eq!(quantity("at least 40 kA").expect("bound").bound, Some(Bound::Least));
        assert_eq!(quantity("At  most 30 ms").expect("bound").bound, Some(Bound::Greatest));
        for range in ["-25 to 40 degC", "-25 degC to 40 degC", "93-121 V", "93 - 121 V", "93 – 121 V", "93..121 V"] {
            let (joint, second) = quantity(range).expect(range).second.expect(range);
            assert_eq!(joint, Joint::Range, "{range}");
            assert!(second.number.value > 39.0, "{range}");
        }
        let (joint, second) = quantity("1 050 + 170 kV").expect("sum").second.expect("sum");
        assert_eq!((joint, second.number.value), (Joint::Sum, 170.0));
    }

    #[test]
    fn what_follows_a_quantity() {
        let tails = quantity("20 kA for 1 s").expect("for").tails;
        assert_eq!((tails[0].0, tails[0].1.number.value), (Tail::For, 1.0));
        let tails = quantity("2500 MVA at 110 kV").expect("at").tails;
        assert_eq!((tails[0].0, tails[0].1.number.value), (Tail::At, 110.0));
        let tails = quantity("50 Hz +- 3 %").expect("tolerance").tails;
        assert_eq!((tails[0].0, tails[0].1.number.value), (Tail::Tolerance, 3.0));
        let again = quantity("40 degC (104 degF)").expect("bracket").brackets;
        assert_eq!(again[0].first.number.value, 104.0);
    }

    #[test]
    fn a_fault_says_where_and_what() {
        let fault = quantity("forty kA").expect_err("words");
        assert_eq!(fault.at, Span::new(0, 5));
        assert!(fault.expected.contains("a number"), "{}", fault.expected);
        let fault = quantity("40 kA (see note)").expect_err("bracket");
        assert_eq!(fault.at.of("40 kA (see note)"), "see");
    }

    #[test]
    fn sequences_with_any_dash() {
        for text in [
            "O - 0.3 s - CO - 3 min - CO",
            "O-0.3s-CO-3min-CO",
            "O – 0.3 s – CO – 3 min – CO",
            "o-0.3 sec-co-3 mins-co",
        ] {
            let steps = sequence(text).expect(text);
            assert_eq!(steps.len(), 5, "{text}");
            assert!(matches!(&steps[2], Step::Operation(o, _) if o == "CO"), "{text}");
            assert!(matches!(&steps[3], Step::Pause(p) if p.number.value == 3.0 && p.unit.len() == 1), "{text}");
        }
        assert!(matches!(sequence("O - t - CO - t' - CO").expect("symbols")[3], Step::Symbol(_)));
        assert!(sequence("O 0.3 s CO").is_err());
    }

    #[test]
    fn gases_and_mixtures() {
        let co2 = gases("CO2 70 % + O2 30 %").expect("mixture");
        assert_eq!(co2[0].len(), 2);
        assert_eq!(co2[0][1].share.expect("share").value, 30.0);
        assert_eq!(gases("SF6 or dry air").expect("alternatives")[1][0].formula, "dry air");
        assert_eq!(gases("SF6 + N2").expect("no shares")[0].len(), 2);
        assert_eq!(gases("30 % O2 + 70 % CO2").expect("share first")[0][0].formula, "O2");
    }

    #[test]
    fn dates_lists_and_alternatives() {
        assert_eq!(date("2029-09").expect("month"), Date { year: 2029, month: 9, day: None });
        assert_eq!(date("2029-09-30").expect("day").day, Some(30));
        assert!(date("09/2029").is_err());
        let texts: Vec<_> =
            list("IEC 62271-1:2017, IEC 62271-100:2021").expect("list").into_iter().map(|i| i.text).collect();
        assert_eq!(texts, ["IEC 62271-1:2017", "IEC 62271-100:2021"]);
        let texts: Vec<_> = options("live tank or dead tank").expect("options").into_iter().map(|i| i.text).collect();
        assert_eq!(texts, ["live tank", "dead tank"]);
        assert_eq!(list("\"a, b\", c").expect("quotes")[0].text, "a, b");
    }

    /// Every rule that a public function enters by ends in EOI, so that nothing after a value is passed over in silence.
    #[test]
    fn entry_rules_read_to_the_end() {
        assert!(quantity("145 kV ;").is_err());
        assert!(sequence("O - CO ;").is_err());
        assert!(gases("SF6 ;").is_err());
        assert!(date("2029-09 x").is_err());
        let grammar = include_str!("../cbspec.pest");
        for entry in
            ["line ", "quantity_value", "sequence_value", "gas_value", "date_value", "options_value", "list_value"]
        {
            let rule = grammar.lines().find(|l| l.starts_with(entry)).expect(entry);
            assert!(rule.contains("SOI") && rule.trim_end().ends_with("EOI }"), "{rule}");
        }
    }
}
