//! What `from duty` chooses: the smallest standard value that meets the duty, with its working; or what is missing for it.

mod capacitive;
mod insulation;
mod operation;
mod ratings;
mod service;
mod trv;

use super::Case;
use crate::particular::Particular;
use crate::quantity::{Dimension, Measure, canonical, look_up, significant};
use crate::sheet::{Class, Pause, QuantityReading, Reading, Sequence, SequenceStep, Statement};
use crate::source::Place;
use crate::standards::Regime;

/// A chosen value.
struct Chosen {
    value: Value,
    working: String,
}

/// What can be chosen.
enum Value {
    Measure(Measure),
    Word(&'static str),
    YesNo(bool),
    Classes(Vec<(char, u8)>),
    /// O - t - CO - t' - CO, with its two pauses.
    Sequence(Measure, Measure),
}

/// Why nothing is chosen.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum NotChosen {
    /// The duty does not say enough: what is missing.
    Needs(String),
    /// The duty says that no value of the standards meets it, or that none is asked for.
    NoValue(String),
}

type Outcome = Result<Chosen, NotChosen>;

/// How a particular is chosen.
struct Choice {
    particular: &'static Particular,
    choose: fn(&Case<'_>) -> Outcome,
    /// Whether figures of the duty, on which later choices rest, hang on it.
    hangs: bool,
}

impl Choice {
    const fn base(particular: &'static Particular, choose: fn(&Case<'_>) -> Outcome) -> Self {
        Self { particular, choose, hangs: true }
    }

    const fn leaf(particular: &'static Particular, choose: fn(&Case<'_>) -> Outcome) -> Self {
        Self { particular, choose, hangs: false }
    }
}

fn needs<T>(what: impl Into<String>) -> Result<T, NotChosen> {
    Err(NotChosen::Needs(what.into()))
}

fn no_value<T>(why: impl Into<String>) -> Result<T, NotChosen> {
    Err(NotChosen::NoValue(why.into()))
}

/// What is known, or that it is missing.
fn known<T>(value: Option<T>, what: &str) -> Result<T, NotChosen> {
    value.ok_or_else(|| NotChosen::Needs(what.to_owned()))
}

/// All choices, in the order in which ratings hang on each other.
fn choices() -> impl Iterator<Item = &'static Choice> {
    [ratings::CHOICES, trv::CHOICES, insulation::CHOICES, operation::CHOICES, capacitive::CHOICES, service::CHOICES]
        .into_iter()
        .flatten()
}

/// Why a particular that is left to the duty has no value; none where the checker cannot choose it at all.
pub(crate) fn why_open(case: &Case<'_>, particular: &Particular) -> Option<NotChosen> {
    let choice = choices().find(|choice| choice.particular.is(particular))?;
    (choice.choose)(case).err()
}

/// Puts a value wherever the text says `from duty` and the duty is known; tells whether any was put in.
pub(super) fn fill(case: &mut Case<'_>) -> bool {
    let mut any = false;
    for choice in choices() {
        if !case.breaker.all(choice.particular).any(|s| s.reading == Reading::FromDuty) {
            continue;
        }
        let Ok(chosen) = (choice.choose)(case) else { continue };
        let open =
            |statement: &Statement| statement.states(choice.particular) && statement.reading == Reading::FromDuty;
        for statement in case.breaker.facts.statements_mut(open) {
            statement.reading = chosen.value.reading(statement.value);
            statement.chosen = Some(chosen.working.clone());
            any = true;
        }
        if choice.hangs {
            case.duty = crate::duty::Duty::of(case);
        }
    }
    any
}

/// A value that was chosen, as an author would write it; none for readings that nothing chooses.
pub fn as_written(reading: &Reading) -> Option<String> {
    match reading {
        Reading::Quantity(quantity) => Some(quantity.shown()),
        Reading::Words(words) => Some(words.join(" or ")),
        Reading::YesNo(yes) => Some(if *yes { "required" } else { "not required" }.to_owned()),
        Reading::Classes(classes) => Some(classes.iter().map(ToString::to_string).collect::<Vec<_>>().join(", ")),
        Reading::Sequence(sequence) => Some(sequence.to_string()),
        _ => None,
    }
}

impl Value {
    fn reading(&self, place: Place) -> Reading {
        let pause = |measure: &Measure| SequenceStep::Pause(Pause { measure: Some(*measure), place, bare: None });
        match self {
            Self::Measure(measure) => Reading::Quantity(QuantityReading {
                measure: *measure,
                second: None,
                bound: None,
                qualifiers: Vec::new(),
                at: None,
                lasting: None,
                tolerance: None,
                again: Vec::new(),
                place,
            }),
            Self::Word(word) => Reading::Words(vec![word]),
            Self::YesNo(yes) => Reading::YesNo(*yes),
            Self::Classes(classes) => Reading::Classes(
                classes.iter().map(|(letter, grade)| Class { letter: *letter, grade: *grade, place }).collect(),
            ),
            Self::Sequence(first, second) => Reading::Sequence(Sequence {
                steps: vec![
                    SequenceStep::Open,
                    pause(first),
                    SequenceStep::CloseOpen,
                    pause(second),
                    SequenceStep::CloseOpen,
                ],
            }),
        }
    }
}

#[expect(clippy::unnecessary_wraps, reason = "what a choice ends with")]
fn chosen(measure: Measure, working: impl Into<String>) -> Outcome {
    Ok(Chosen { value: Value::Measure(measure), working: working.into() })
}

#[expect(clippy::unnecessary_wraps, reason = "what a choice ends with")]
fn word(word: &'static str, working: impl Into<String>) -> Outcome {
    Ok(Chosen { value: Value::Word(word), working: working.into() })
}

#[expect(clippy::unnecessary_wraps, reason = "what a choice ends with")]
fn yes_no(yes: bool, working: impl Into<String>) -> Outcome {
    Ok(Chosen { value: Value::YesNo(yes), working: working.into() })
}

/// A value in SI base units as a measure in this unit.
fn measure(value: f64, dimension: Dimension, unit: &str) -> Measure {
    let unit = look_up(unit, &[dimension]).map_or_else(|| canonical(dimension), |spelt| spelt.unit);
    let number = unit.from_si(value).unwrap_or(value);
    // Rounded to what the tables print, so that 31.5 kA is not 31.499999 kA.
    let number = (number * 1e4).round() / 1e4;
    let text = significant(number, 6);
    let decimals = text.split_once('.').map_or(0, |(_, fraction)| fraction.len() as u8);
    Measure { number, decimals, unit, si: unit.to_si(number).or(Some(value)) }
}

/// The same to three significant digits, as tables print what follows by a formula.
fn printed(value: f64, dimension: Dimension, unit: &str) -> Measure {
    let exact = measure(value, dimension, unit);
    let text = significant(exact.number, 3);
    let Ok(number) = text.parse::<f64>() else { return exact };
    let decimals = text.split_once('.').map_or(0, |(_, fraction)| fraction.len() as u8);
    Measure { number, decimals, si: exact.unit.to_si(number).or(exact.si), ..exact }
}

fn regimes(case: &Case<'_>) -> Vec<Regime> {
    case.regimes().families()
}

#[cfg(test)]
mod testing {
    use super::why_open;
    use crate::case::{Case, as_written};
    use crate::particular::SheetKind;
    use crate::rules::Policy;
    use crate::rules::testing::Bay;
    use crate::sheet::Reading;
    use crate::{Assessor, Sources};

    /// What is chosen for a label of the breaker of a bay: the value, or why there is none.
    pub(super) fn choice(bay: Bay, label: &str) -> Result<(String, String), String> {
        choice_with(bay, label, &Policy::default())
    }

    /// The same by another policy.
    pub(super) fn choice_with(bay: Bay, label: &str, policy: &Policy) -> Result<(String, String), String> {
        let bay = bay.set("breaker", label, "from duty");
        let assessment = Assessor::standard().assess(&Sources::of("bay.cbspec", bay.text()));
        let sheet = assessment.set.of_kind(SheetKind::Breaker).next().expect("a breaker");
        let case = Case::new(&assessment.set, sheet, policy);
        let statement = case
            .breaker
            .statements()
            .iter()
            .find(|s| s.wording.to_lowercase() == label.to_lowercase())
            .expect("the line");
        match (&statement.reading, &statement.chosen) {
            (Reading::FromDuty, _) => Err(format!("{:?}", why_open(&case, statement.particular))),
            (reading, Some(working)) => Ok((as_written(reading).expect("a value"), working.clone())),
            (reading, None) => panic!("{label}: {reading:?}"),
        }
    }

    /// That this value is chosen.
    #[track_caller]
    pub(super) fn chooses(bay: Bay, label: &str, value: &str) {
        let (got, working) = choice(bay, label).unwrap_or_else(|why| panic!("{label}: {why}"));
        assert_eq!(got, value, "{label}: {working}");
        assert!(!working.is_empty());
    }

    /// That nothing is chosen, and that the reason names this.
    #[track_caller]
    pub(super) fn open(bay: Bay, label: &str, why: &str) {
        let told = choice(bay.clone(), label).expect_err("nothing is chosen");
        assert!(told.contains(why), "{label}: {told}");
        let finding = bay.set("breaker", label, "from duty").one("from-duty-open");
        assert!(format!("{} {:?}", finding.message, finding.advice).contains(why), "{finding:?}");
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Whatever is chosen is declared as one that may be left to the duty, and once.
    #[test]
    fn only_what_may_be_left_to_the_duty() {
        let mut seen: Vec<&str> = Vec::new();
        for choice in choices() {
            let label = choice.particular.label;
            assert!(choice.particular.from_duty, "{label}");
            assert!(!seen.contains(&label), "{label} twice");
            seen.push(label);
        }
    }
}
