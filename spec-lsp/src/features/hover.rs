//! Hover: what a label means, what a value is in other units and which figures of the duty rest on it, what a name names.

use firstpole_core::case::Case;
use firstpole_core::particular::{Kind, Particular, SheetKind};
use firstpole_core::quantity::{Physical, Pressure, look_up, significant};
use firstpole_core::rules::{self, Policy};
use firstpole_core::sheet::{About, LinkTarget, QuantityReading, Reading, Sheet, Statement};
use firstpole_core::standards::GAUGE_REFERENCE;
use firstpole_core::{Assessment, FileId, Place, Span};

use super::spot::{label_and_value, line_at, name_at, particular_of, sheet_at, statement_at};
use super::text::Text;

/// A text and what it is about.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Hover {
    /// What it is about.
    pub span: Span,
    /// The text.
    pub text: Text,
}

/// What there is to say at an offset.
pub fn hover(assessment: &Assessment, file: FileId, offset: u32) -> Option<Hover> {
    if let Some(named) = name_at(assessment, file, offset) {
        return Some(Hover { span: assessment.span(named.place), text: of_sheet(assessment, named.sheet) });
    }
    let sheet = sheet_at(assessment, file, offset)?;
    if let Some(hover) = of_rule(assessment, sheet, offset) {
        return Some(hover);
    }
    if let Some((statement, value)) = statement_at(assessment, sheet, offset) {
        return Some(if value {
            Hover { span: assessment.span(statement.value), text: of_value(assessment, sheet, statement) }
        } else {
            Hover { span: assessment.span(statement.label), text: of_label(statement.about, statement.particular) }
        });
    }
    // A label whose line cannot be kept, for the second of two of one kind or so.
    let source = assessment.sources.file(file)?;
    let (label, _) = label_and_value(line_at(source, offset)?)?;
    let particular = particular_of(sheet.kind, label.of(&source.text)).filter(|_| label.touches(offset))?;
    Some(Hover { span: label, text: of_label(About::Value, particular) })
}

/// What a particular is: label, symbols, meaning, unit, sense and basis.
pub fn of_particular(particular: &Particular) -> Text {
    let mut rows = Vec::new();
    if !particular.symbols.is_empty() {
        rows.push(("symbol".to_owned(), particular.symbols.join(", ")));
    }
    rows.push(("written".to_owned(), written(particular)));
    rows.push(("sense".to_owned(), particular.sense.word().to_owned()));
    if particular.from_duty {
        rows.push(("from duty".to_owned(), "the checker can choose it".to_owned()));
    }
    if particular.carried {
        rows.push(("checked".to_owned(), "no; it is carried into the schedule".to_owned()));
    }
    rows.push(("basis".to_owned(), particular.basis.to_owned()));
    Text::new().title(particular.label).sentence(particular.meaning).table(rows)
}

fn of_label(about: About, particular: &Particular) -> Text {
    match about {
        About::Value => of_particular(particular),
        About::Reason => Text::new()
            .title(format!("reason for {}", particular.label))
            .sentence("Why it is wanted: silences an excess or a caution on that line."),
        About::Tested => {
            Text::new().title(format!("type-tested {}", particular.label)).sentence("What a report proves of it.")
        }
    }
}

/// How a value of the particular is written.
pub fn written(particular: &Particular) -> String {
    match &particular.kind {
        Kind::Quantity(kind) => {
            let word = kind.qualifier.map(|qualifier| format!(" {}", qualifier.word())).unwrap_or_default();
            format!("a quantity in {}{word}", kind.units.join(", "))
        }
        Kind::WordsOrQuantity(list, kind) => format!("{}, or a quantity in {}", some(list), kind.units.join(", ")),
        Kind::Ratio => "a number without unit".to_owned(),
        Kind::Count => "a whole number".to_owned(),
        Kind::Year => "a year".to_owned(),
        Kind::Words { list, alternatives } => {
            let or = if *alternatives { "; several are joined by or" } else { "" };
            format!("{}{or}", some(list))
        }
        Kind::WordsOrText(list) => format!("{}, or a text", some(list)),
        Kind::DateOrWords(list) => format!("a date, or {}", some(list)),
        Kind::YesNo => "yes or no".to_owned(),
        Kind::Date => "a date, 2029-09 or 2029-09-30".to_owned(),
        Kind::Text => "a text".to_owned(),
        Kind::Texts => "texts, with commas between".to_owned(),
        Kind::Names => "names of sheets or bays, with commas between".to_owned(),
        Kind::WordSet(list) => format!("{}, with commas between", some(list)),
        Kind::Standards => "standards, with commas between".to_owned(),
        Kind::Labels => "labels, with commas between".to_owned(),
        Kind::Classes => "classes, such as C2, M2".to_owned(),
        Kind::Sequence => "a sequence, such as O - 0.3 s - CO - 3 min - CO".to_owned(),
        Kind::Gas => "a gas or a mixture, such as CO2 70 % + O2 30 %".to_owned(),
        Kind::Gases => "gases, with commas between".to_owned(),
        Kind::Expression => "a condition".to_owned(),
        Kind::Outcome => "a kind of finding and a text".to_owned(),
        Kind::AsLabel => "as the particular that it speaks of".to_owned(),
    }
}

/// The words of a list; of a long one the first few.
fn some(list: &firstpole_core::particular::WordList) -> String {
    const MOST: usize = 12;
    let words: Vec<&str> = list.all().collect();
    let shown = words.get(..words.len().min(MOST)).unwrap_or(&[]).join(", ");
    if words.len() > MOST { format!("{shown} ...") } else { shown }
}

fn of_value(assessment: &Assessment, sheet: &Sheet, statement: &Statement) -> Text {
    let mut text = Text::new().title(statement.particular.label);
    match &statement.reading {
        Reading::Unknown => text = text.sentence("This could not be read; it counts as unknown."),
        Reading::Open(by) => {
            let by = by.as_ref().map(|by| format!(": {by}")).unwrap_or_default();
            text = text.sentence(format!("Left open{by}."));
        }
        Reading::FromDuty => text = text.and(chosen(assessment, sheet, statement)),
        Reading::Quantity(quantity) => text = text.table(in_other_units(statement.particular, quantity)),
        Reading::Words(_)
        | Reading::YesNo(_)
        | Reading::None
        | Reading::Date(_)
        | Reading::Text(_)
        | Reading::List(_)
        | Reading::Classes(_)
        | Reading::Sequence(_)
        | Reading::Gas(_) => {}
    }
    text.and(needed(assessment, statement.value))
        .and(figures(assessment, statement.value))
        .sentence(statement.particular.meaning)
}

/// What the checker chose, for each breaker that takes the line over.
fn chosen(assessment: &Assessment, sheet: &Sheet, statement: &Statement) -> Text {
    let policy = Policy::default();
    let mut text = Text::new();
    let mut known = false;
    let takers = assessment.set.of_kind(SheetKind::Breaker).filter(|breaker| {
        breaker.id == sheet.id
            || sheet.kind != SheetKind::Offer
                && assessment.set.resolved(breaker.id).iter().any(|taken| taken.value == statement.value)
    });
    for breaker in takers {
        let case = Case::new(&assessment.set, breaker, &policy);
        let found = case.breaker.statements().iter().find(|taken| taken.value == statement.value);
        let Some((quantity, working)) = found.and_then(|taken| taken.quantity().zip(taken.chosen.as_ref())) else {
            continue;
        };
        known = true;
        text = text.sentence(format!("The duty of {} asks for {}.", breaker.name, quantity.shown())).formula(working);
    }
    if known { text } else { text.sentence("The text does not say enough for the checker to choose it.") }
}

/// The quantity in the units of its particular, as they were not written.
fn in_other_units(particular: &Particular, quantity: &QuantityReading) -> Vec<(String, String)> {
    let (Kind::Quantity(kind) | Kind::WordsOrQuantity(_, kind)) = &particular.kind else { return Vec::new() };
    let mut rows = Vec::new();
    if let Some(absolute) = quantity.measure.to::<Pressure>().and_then(|_| quantity.absolute()) {
        if !absolute.stated {
            rows.push(("reference".to_owned(), "not stated; read as absolute".to_owned()));
        }
        let gauge = absolute.pressure.si() - GAUGE_REFERENCE.value().si();
        let mut row = |unit: &str, words: &str, si: f64| {
            if let Some(number) = look_up(unit, kind.dimensions).and_then(|spelt| spelt.unit.from_si(si)) {
                rows.push((format!("{unit} {words}"), significant(number, 4)));
            }
        };
        for unit in kind.units {
            row(unit, "abs", absolute.pressure.si());
        }
        for unit in kind.units.iter().take(1).chain(kind.units.iter().filter(|unit| **unit == "psi")) {
            row(unit, "gauge", gauge);
        }
        return rows;
    }
    let Some(si) = quantity.measure.si else { return rows };
    for unit in kind.units {
        let Some(spelt) = look_up(unit, &[quantity.dimension()]) else { continue };
        if spelt.unit.dimension != quantity.dimension() || *spelt.unit == *quantity.measure.unit {
            continue;
        }
        if let Some(number) = spelt.unit.from_si(si) {
            rows.push(("also".to_owned(), format!("{} {}", significant(number, 4), spelt.unit.name)));
        }
    }
    rows
}

/// What open findings on the value ask for.
fn needed(assessment: &Assessment, place: Place) -> Text {
    let rows = assessment
        .findings()
        .iter()
        .filter(|finding| finding.place == place && finding.accepted.is_none())
        .filter_map(|finding| finding.needed.as_ref().map(|needed| (finding, needed)))
        .map(|(finding, needed)| {
            let breaker = finding.breaker.as_ref().map(|name| format!(" in {name}")).unwrap_or_default();
            (format!("{}{breaker} asks for", finding.rule), needed.text.clone())
        })
        .collect();
    Text::new().table(rows)
}

/// The figures of the duty that rest on a statement, with their working. One that several breakers share is told once.
fn figures(assessment: &Assessment, place: Place) -> Text {
    const MOST: usize = 8;
    let mut rows: Vec<(String, String)> = Vec::new();
    let several = assessment.cases().len() > 1;
    for case in assessment.cases() {
        for figure in case.duty.iter().filter(|figure| figure.places.contains(&place)) {
            let Some(working) = figure.working.as_ref().filter(|working| !working.starts_with("as stated")) else {
                continue;
            };
            let name = figure.key.replace('_', " ");
            if rows.iter().any(|(_, known)| known == working) {
                continue;
            }
            let name = if several { format!("{name} of {}", case.breaker) } else { name };
            rows.push((name, working.clone()));
        }
    }
    let more = rows.len().saturating_sub(MOST);
    rows.truncate(MOST);
    if more > 0 {
        rows.push(("and".to_owned(), format!("{more} more figures")));
    }
    if rows.is_empty() { Text::new() } else { Text::new().sentence("The duty rests on it:").table(rows) }
}

fn of_sheet(assessment: &Assessment, sheet: &Sheet) -> Text {
    let file = assessment.sources.file(sheet.file());
    let place = file.map_or_else(String::new, |file| {
        format!("{}, line {}", file.name, file.position(assessment.span(sheet.heading).start).line)
    });
    let rows = sheet
        .statements
        .iter()
        .filter(|statement| statement.about == About::Value)
        .take(12)
        .map(|statement| (statement.particular.label.to_owned(), assessment.sources.text(statement.value).to_owned()))
        .collect();
    Text::new().title(sheet.title()).table(rows).sentence(place)
}

/// The rule that a deviation speaks of.
fn of_rule(assessment: &Assessment, sheet: &Sheet, offset: u32) -> Option<Hover> {
    let (link, place) = sheet.links.iter().find(|(_, place)| assessment.span(*place).touches(offset))?;
    let LinkTarget::Rule(name) = sheet.targets.iter().find(|(word, _)| *word == link.word).map(|(_, target)| target)?
    else {
        return None;
    };
    let rule = rules::standard().into_iter().find(|rule| rule.name == *name)?;
    let text = Text::new()
        .title(rule.name)
        .sentence(rule.title)
        .table(vec![("compares".to_owned(), rule.formula.to_owned()), ("basis".to_owned(), rule.basis.to_owned())])
        .sentence(rule.explanation);
    Some(Hover { span: assessment.span(*place), text })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, at_cursor, bay_after, text_of};

    fn plain(before: &str) -> String {
        let (assessment, at) = bay_after(before);
        hover(&assessment, FileId(0), at).expect("a hover").text.plain()
    }

    #[test]
    fn a_label_says_what_it_means() {
        let text = plain("    Is");
        for part in ["rated short-circuit breaking current", "symbol: Isc", "kA rms", "basis: "] {
            assert!(text.contains(part), "{part} is not in {text}");
        }
    }

    #[test]
    fn a_value_in_other_units_with_what_rests_on_it() {
        let text = plain("X/R:                2");
        assert!(text.contains("dc time constant: "), "{text}");
        let text = plain("lowest ambient:     -2");
        assert!(text.contains("also: -13 degF"), "{text}");
        let text = plain("0.70 MPa a");
        assert!(text.contains("bar abs: 7") && text.contains("MPa gauge: 0.5987"), "{text}");
    }

    #[test]
    fn a_value_that_the_duty_chose() {
        let text = plain("from dut");
        assert!(text.contains("The duty of LineBay asks for ") && text.contains(" kA"), "{text}");
        let (assessment, at) = at_cursor("cbspec 1\nbreaker A\n    making current: from| duty\n");
        let text = hover(&assessment, FileId(0), at).expect("a hover").text.plain();
        assert!(text.contains("does not say enough"), "{text}");
    }

    #[test]
    fn a_value_with_a_finding_says_what_is_needed() {
        let (assessment, at) = at_cursor(&BAY.replace("DC time constant:   45 ms", "DC time constant:   45| ms"));
        let hover = hover(&assessment, FileId(0), at).expect("a hover");
        assert_eq!(text_of(&assessment, hover.span), "45 ms");
        assert!(hover.text.plain().contains(" asks for: "), "{}", hover.text.plain());
    }

    #[test]
    fn names_and_rules() {
        assert!(plain("LineBay on Ring").contains("highest voltage: 145 kV"));
        let text = BAY.to_owned() + "deviation from gas-lique|faction in LineBay\n";
        let (assessment, at) = at_cursor(&text);
        let hover = hover(&assessment, FileId(0), at).expect("a hover");
        assert!(hover.text.plain().starts_with("gas-liquefaction\n"));
    }

    #[test]
    fn nothing_where_there_is_nothing() {
        let (assessment, at) = at_cursor("cbspec| 1\n\nbreaker A # no|te\n");
        assert!(hover(&assessment, FileId(0), at).is_none());
        assert!(hover(&assessment, FileId(0), 9999).is_none());
        assert!(hover(&assessment, FileId(7), 0).is_none());
    }
}
