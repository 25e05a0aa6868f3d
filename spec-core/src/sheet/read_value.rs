//! From the text of a value to its reading, in the form that its particular asks for.

use firstpole_grammar::value::{self, Step};
use firstpole_grammar::{Span, ValueForm, ValueText};

use super::reading::{Class, Date, Item, Mixture, Pause, Sequence, SequenceStep, Share};
use super::{Reading, read_quantity};
use crate::finding::{Finding, Findings};
use crate::particular::words::{GAS, WordList, folded};
use crate::particular::{Kind, Particular, QuantityKind};
use crate::quantity::{Dimension, Measure, look_up};
use crate::rules::sequence::SEQUENCE_MALFORMED;
use crate::rules::{Rule, reading as rules};
use crate::source::Place;

/// Reads one value and says what is wrong with it.
pub(super) struct Reader<'a> {
    /// Where findings go.
    pub findings: &'a mut Findings,
    /// What the value is of.
    pub particular: &'static Particular,
    /// Where the value stands.
    pub place: Place,
    /// Its text.
    pub text: &'a str,
}

impl Reader<'_> {
    /// Reads the value in the form of its particular.
    pub fn read(&mut self, value: &ValueText) -> Reading {
        match &value.form {
            ValueForm::Missing => return Reading::Open(None),
            ValueForm::OpenPoint(who) => return Reading::Open(who.clone()),
            ValueForm::FromDuty if self.particular.from_duty => return Reading::FromDuty,
            ValueForm::FromDuty => {
                let label = self.particular.label;
                let message = format!("{label} does not follow from the duty: it has to be stated");
                self.find(&rules::FROM_DUTY_MISPLACED, self.place, message).stated("from duty");
                return Reading::Unknown;
            }
            ValueForm::Plain => {}
        }
        if self.is_placeholder() {
            return Reading::Open(None);
        }
        match &self.particular.kind {
            Kind::Quantity(kind) => self.quantity(kind),
            Kind::Ratio => read_quantity::number(self, false),
            Kind::Count | Kind::Year => read_quantity::number(self, true),
            Kind::Words { list, alternatives } => self.words(list, *alternatives),
            Kind::WordsOrQuantity(list, kind) => match list.read(self.text) {
                Some(word) => Reading::Words(vec![word]),
                None => self.quantity(kind),
            },
            Kind::WordsOrText(list) => match list.read(self.text) {
                Some(word) => Reading::Words(vec![word]),
                None if self.text.starts_with('"') => Reading::Text(unquoted(self.text)),
                None => self.words(list, false),
            },
            Kind::DateOrWords(list) => match list.read(self.text) {
                Some(word) => Reading::Words(vec![word]),
                None => self.date(),
            },
            Kind::YesNo => self.yes_no(),
            Kind::Date => self.date(),
            Kind::Text | Kind::Expression | Kind::Outcome | Kind::AsLabel => Reading::Text(unquoted(self.text)),
            Kind::Texts | Kind::Names | Kind::Labels | Kind::Standards => self.list(),
            Kind::WordSet(list) => self.word_set(list),
            Kind::Classes => self.classes(),
            Kind::Sequence => self.sequence(),
            Kind::Gas | Kind::Gases => self.gas(),
        }
    }

    fn quantity(&mut self, kind: &QuantityKind) -> Reading {
        if kind.none && matches!(folded(self.text).as_str(), "none" | "not required" | "no") {
            return Reading::None;
        }
        read_quantity::quantity(self, kind)
    }

    /// Whether the text only says that a value will come.
    fn is_placeholder(&self) -> bool {
        const WORDS: [&str; 12] = [
            "later",
            "tbc",
            "tba",
            "tbd",
            "?",
            "??",
            "...",
            "to be confirmed",
            "to be advised",
            "to be agreed",
            "to be decided",
            "to be determined",
        ];
        // folded() reads a hyphen as a blank, so that a lone dash becomes nothing.
        let text = folded(self.text);
        let plain = !matches!(self.particular.kind, Kind::Text | Kind::Texts | Kind::Names);
        text.is_empty()
            || WORDS.contains(&text.as_str())
            || (plain && ["as per ", "refer ", "see "].iter().any(|start| text.starts_with(start)))
    }

    fn words(&mut self, list: &'static WordList, alternatives: bool) -> Reading {
        let Some(options) = self.accept(value::options(self.text), "words") else { return Reading::Unknown };
        let mut words = Vec::new();
        for option in &options {
            match known_words(list, &option.text, alternatives) {
                Some(found) => words.extend(found),
                None => {
                    self.unknown_word(list, &option.text, option.span);
                    return Reading::Unknown;
                }
            }
        }
        if options.len() > 1 && !alternatives {
            let message = format!("{} takes one of: {}", self.particular.label, listed(list));
            self.find(&rules::UNREADABLE_VALUE, self.place, message).label("several words");
            return Reading::Unknown;
        }
        Reading::Words(words)
    }

    fn word_set(&mut self, list: &'static WordList) -> Reading {
        let Some(items) = self.accept(value::list(self.text), "words") else { return Reading::Unknown };
        let mut words = Vec::new();
        for item in &items {
            let Some(word) = list.read(&item.text) else {
                self.unknown_word(list, &item.text, item.span);
                return Reading::Unknown;
            };
            words.push(word);
        }
        if words == ["none"] { Reading::None } else { Reading::Words(words) }
    }

    fn unknown_word(&mut self, list: &WordList, text: &str, span: Span) {
        let place = self.at(span);
        let near = nearest_word(list, text);
        let message = match near {
            Some(word) => format!("{text} is not among the words of {}; {word} is near", self.particular.label),
            None => format!("{text} is not among the words of {}: {}", self.particular.label, listed(list)),
        };
        let finding = self.find(&rules::UNKNOWN_WORD, place, message);
        finding.label("not a word of this list").stated(text).advice(format!("the words are: {}", listed(list)));
        if let Some(word) = near {
            finding.replace_by(word);
        }
    }

    fn yes_no(&mut self) -> Reading {
        match folded(self.text).as_str() {
            "yes" | "required" => Reading::YesNo(true),
            "no" | "not required" | "none" => Reading::YesNo(false),
            _ => {
                let message = format!("{} wants yes or no", self.particular.label);
                let place = self.place;
                self.find(&rules::UNREADABLE_VALUE, place, message)
                    .label("neither yes nor no")
                    .edit("write yes", place, "yes")
                    .edit("write no", place, "no");
                Reading::Unknown
            }
        }
    }

    fn date(&mut self) -> Reading {
        let Some(date) = self.accept(value::date(self.text), "a date such as 2029-09 or 2029-09-30") else {
            return Reading::Unknown;
        };
        match Date::new(date.year, date.month, date.day) {
            Some(date) => Reading::Date(date),
            None => {
                let message = format!("there is no day {} in the calendar", self.text);
                let place = self.place;
                self.find(&rules::UNREADABLE_VALUE, place, message).label("no such day");
                Reading::Unknown
            }
        }
    }

    fn list(&mut self) -> Reading {
        if folded(self.text) == "none" {
            return Reading::None;
        }
        let Some(items) = self.accept(value::list(self.text), "a list with commas") else { return Reading::Unknown };
        Reading::List(items.into_iter().map(|item| Item { place: self.at(item.span), text: item.text }).collect())
    }

    fn classes(&mut self) -> Reading {
        let Some(items) = self.accept(value::list(self.text), "classes such as C2, M2") else {
            return Reading::Unknown;
        };
        let mut classes = Vec::new();
        for item in items {
            let place = self.at(item.span);
            let mut letters = item.text.chars();
            let (letter, grade, rest) = (letters.next(), letters.next(), letters.next());
            let class = match (letter.map(|c| c.to_ascii_uppercase()), grade.and_then(|c| c.to_digit(10)), rest) {
                (Some('C'), Some(grade @ 0..=2), None) => Some(('C', grade)),
                (Some(letter @ ('E' | 'M' | 'S')), Some(grade @ 1..=2), None) => Some((letter, grade)),
                _ => None,
            };
            let Some((letter, grade)) = class else {
                let message = format!("{} is no class; the classes are C0 C1 C2, E1 E2, M1 M2, S1 S2", item.text);
                self.find(&rules::UNKNOWN_WORD, place, message).label("no class").stated(item.text.as_str());
                return Reading::Unknown;
            };
            classes.push(Class { letter, grade: grade as u8, place });
        }
        Reading::Classes(classes)
    }

    fn sequence(&mut self) -> Reading {
        let steps = match value::sequence(self.text) {
            Ok(steps) => steps,
            Err(fault) => {
                let place = self.at(fault.at);
                let message = format!("this is no operating sequence: {} would be right here", fault.expected);
                self.find(&SEQUENCE_MALFORMED, place, message)
                    .label("not a step")
                    .advice("write it as O - 0.3 s - CO - 3 min - CO");
                return Reading::Unknown;
            }
        };
        let mut sequence = Sequence { steps: Vec::new() };
        for step in steps {
            sequence.steps.push(match step {
                Step::Operation(word, _) if word == "O" => SequenceStep::Open,
                Step::Operation(word, _) if word == "C" => SequenceStep::Close,
                Step::Operation(..) => SequenceStep::CloseOpen,
                Step::Symbol(span) => SequenceStep::Pause(Pause { measure: None, bare: None, place: self.at(span) }),
                Step::Pause(amount) => {
                    if amount.number.comma {
                        read_quantity::comma(self, &amount);
                        return Reading::Unknown;
                    }
                    let place = self.at(amount.span);
                    let Some(span) = amount.unit.first() else {
                        let bare = Some(amount.number.value);
                        sequence.steps.push(SequenceStep::Pause(Pause { measure: None, bare, place }));
                        continue;
                    };
                    let Some(spelt) = look_up(span.of(self.text).trim_end_matches('.'), &[Dimension::Time]) else {
                        let message = format!("{} is no unit of time", span.of(self.text));
                        let place = self.at(*span);
                        self.find(&rules::UNKNOWN_UNIT, place, message).label("no unit of time");
                        return Reading::Unknown;
                    };
                    let measure = Measure::new(amount.number.value, amount.number.decimals, spelt.unit);
                    SequenceStep::Pause(Pause { measure: Some(measure), bare: None, place })
                }
            });
        }
        Reading::Sequence(sequence)
    }

    fn gas(&mut self) -> Reading {
        if matches!(self.particular.kind, Kind::Gases) && folded(self.text) == "fluorinated gases" {
            return Reading::Words(vec!["fluorinated gases"]);
        }
        let Some(gases) =
            self.accept(value::gases(self.text), "a gas by its formula, such as SF6 or CO2 70 % + O2 30 %")
        else {
            return Reading::Unknown;
        };
        let mut mixtures = Vec::new();
        for gas in gases {
            let mut portions: Vec<Share> = Vec::new();
            let mut span = gas.first().map_or(Span::default(), |p| p.span);
            for portion in gas {
                span.end = portion.span.end.max(portion.share.map_or(0, |s| s.span.end));
                let Some(word) = GAS.read(&portion.formula) else {
                    self.unknown_word(&GAS, &portion.formula, portion.span);
                    return Reading::Unknown;
                };
                if let Some(share) = portion.share.filter(|s| s.comma) {
                    read_quantity::comma_at(self, share);
                    return Reading::Unknown;
                }
                portions.push(Share { gas: word, fraction: portion.share.map(|s| s.value / 100.0) });
            }
            let place = self.at(span);
            if !self.shares_add_up(&portions, place) {
                return Reading::Unknown;
            }
            mixtures.push(Mixture { portions, place });
        }
        Reading::Gas(mixtures)
    }

    fn shares_add_up(&mut self, portions: &[Share], place: Place) -> bool {
        let stated: Vec<f64> = portions.iter().filter_map(|p| p.fraction).collect();
        let sum: f64 = stated.iter().sum();
        let message = if stated.is_empty() {
            return true;
        } else if stated.len() < portions.len() {
            "some gases of this mixture have a share and some have none".to_owned()
        } else if (sum - 1.0).abs() > 0.0005 || stated.iter().any(|f| *f <= 0.0) {
            format!("the shares of this mixture add up to {} %", crate::quantity::rounded(sum * 100.0, 2))
        } else {
            return true;
        };
        self.find(&rules::GAS_SHARES, place, message)
            .label("shares")
            .advice("write the mole fraction of each gas in percent, all together 100 %, or no shares at all");
        false
    }

    /// The value, or a finding that says what would have been right.
    fn accept<T>(&mut self, read: Result<T, value::ValueFault>, form: &str) -> Option<T> {
        read.map_err(|fault| self.refuse(&fault, form)).ok()
    }

    /// A finding that the value is not in its form.
    pub fn refuse(&mut self, fault: &value::ValueFault, form: &str) {
        let place = self.at(if fault.at.is_empty() { Span::new(0, self.text.len() as u32) } else { fault.at });
        let label = self.particular.label;
        let stopped = fault.at.of(self.text);
        let message = if stopped.is_empty() {
            format!("{label} wants {form}; this breaks off where {} is expected", fault.expected)
        } else {
            format!("{label} wants {form}; {stopped} cannot be read: expected {}", fault.expected)
        };
        self.find(&rules::UNREADABLE_VALUE, place, message).label("cannot be read");
    }

    /// A place within the value.
    pub const fn at(&self, span: Span) -> Place {
        Place::new(self.place.block(), span.shifted(self.place.within().start))
    }

    /// A finding.
    pub fn find(&mut self, rule: &'static Rule, place: Place, message: impl Into<String>) -> &mut Finding {
        self.findings.add(rule, place, message)
    }
}

/// The words of a list that a text is made of: one, or several with blanks between where that is admitted.
fn known_words(list: &WordList, text: &str, several: bool) -> Option<Vec<&'static str>> {
    if let Some(word) = list.read(text) {
        return Some(vec![word]);
    }
    if !several {
        return None;
    }
    let words: Vec<&str> = text.split_whitespace().collect();
    (1..words.len()).rev().find_map(|at| {
        let (first, rest) = words.split_at_checked(at)?;
        let first = list.read(&first.join(" "))?;
        let mut all = vec![first];
        all.extend(known_words(list, &rest.join(" "), true)?);
        Some(all)
    })
}

fn nearest_word(list: &WordList, text: &str) -> Option<&'static str> {
    let wanted = folded(text);
    list.words
        .iter()
        .flat_map(|w| std::iter::once(w.word).chain(w.also.iter().copied()).map(move |spelling| (w.word, spelling)))
        .map(|(word, spelling)| (strsim::normalized_damerau_levenshtein(&folded(spelling), &wanted), word))
        .filter(|(near, _)| *near >= 0.6)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, word)| word)
}

fn listed(list: &WordList) -> String {
    list.all().collect::<Vec<_>>().join(", ")
}

fn unquoted(text: &str) -> String {
    text.strip_prefix('"').and_then(|t| t.strip_suffix('"')).filter(|t| !t.contains('"')).unwrap_or(text).to_owned()
}
