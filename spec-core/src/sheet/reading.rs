//! What was read of a value.

use firstpole_grammar::value::{Bound, Joint};

use crate::particular::Limit;
use crate::quantity::{Dimension, Frequency, Measure, Physical, Pressure, Qualifier, Time};
use crate::source::Place;
use crate::standards::GAUGE_REFERENCE;

/// What was read of a value.
#[derive(Clone, Debug, PartialEq)]
#[allow(clippy::large_enum_variant, reason = "most readings are quantities, so a box would only add a step")]
pub enum Reading {
    /// It could not be read; a finding says so, and rules that need it stay silent.
    Unknown,
    /// It is left open, by whom and until when.
    Open(Option<String>),
    /// The checker is to choose it.
    FromDuty,
    /// `none`, where that may stand for a quantity or a list.
    None,
    /// A number with its unit, or without one where the particular has none.
    Quantity(QuantityReading),
    /// Words of the particular's list.
    Words(Vec<&'static str>),
    /// Yes or no.
    YesNo(bool),
    /// A date.
    Date(Date),
    /// A text.
    Text(String),
    /// A list of texts.
    List(Vec<Item>),
    /// Classes.
    Classes(Vec<Class>),
    /// An operating sequence.
    Sequence(Sequence),
    /// Gases, each an alternative.
    Gas(Vec<Mixture>),
}

/// A number with its unit, and what was written around it.
#[derive(Clone, Debug, PartialEq)]
pub struct QuantityReading {
    /// The number and its unit; of a range the lower one.
    pub measure: Measure,
    /// The second of a range or a sum.
    pub second: Option<(Joint, Measure)>,
    /// `at least` or `at most`.
    pub bound: Option<Bound>,
    /// Words that say what kind of value it is.
    pub qualifiers: Vec<Qualifier>,
    /// `at`: the voltage of a power, the reference temperature of a pressure.
    pub at: Option<Measure>,
    /// `for`: the duration of a current.
    pub lasting: Option<Measure>,
    /// `+- 3 %`.
    pub tolerance: Option<Measure>,
    /// The same said again in brackets.
    pub again: Vec<QuantityReading>,
    /// Where it stands, brackets left out.
    pub place: Place,
}

/// A pressure with its reference.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AbsolutePressure {
    /// The absolute pressure, taken as absolute where nothing says so.
    pub pressure: Pressure,
    /// Whether the text says absolute or gauge.
    pub stated: bool,
}

impl QuantityReading {
    /// The lower of a range, else the value.
    pub fn lower(&self) -> &Measure {
        match &self.second {
            Some((Joint::Range, second)) if second.si < self.measure.si => second,
            _ => &self.measure,
        }
    }

    /// The upper of a range, else the value.
    pub fn upper(&self) -> &Measure {
        match &self.second {
            Some((Joint::Range, second)) if second.si > self.measure.si => second,
            _ => &self.measure,
        }
    }

    /// As it was written: the value with the words that belong to it.
    pub fn shown(&self) -> String {
        self.shown_with(&self.measure.to_string())
    }

    /// Another value with the same words.
    pub fn shown_with(&self, value: &str) -> String {
        let words: Vec<&str> = self.qualifiers.iter().map(|q| q.word()).collect();
        if words.is_empty() { value.trim_end().to_owned() } else { format!("{value} {}", words.join(" ")) }
    }

    /// Whether it was written as a range.
    pub const fn is_range(&self) -> bool {
        matches!(self.second, Some((Joint::Range, _)))
    }

    /// Whether the text says that it is of this kind.
    pub fn is(&self, qualifier: Qualifier) -> bool {
        self.qualifiers.contains(&qualifier)
    }

    /// The absolute pressure. A gauge pressure is referred to the standard atmosphere whatever the altitude. A pressure without
    /// a reference takes that of its bracket, and is else read as absolute.
    pub fn absolute(&self) -> Option<AbsolutePressure> {
        let value: Pressure = self.measure.to()?;
        let gauge = |reading: &Self| {
            if reading.is(Qualifier::Gauge) {
                Some(true)
            } else if reading.is(Qualifier::Absolute) {
                Some(false)
            } else {
                None
            }
        };
        let reference = gauge(self).or_else(|| self.reference_of_bracket());
        let pressure = if reference == Some(true) { value + GAUGE_REFERENCE.value() } else { value };
        Some(AbsolutePressure { pressure, stated: reference.is_some() })
    }

    /// Gauge (`true`) or absolute, as a bracket that carries its reference shows it: the reading in which the two agree.
    fn reference_of_bracket(&self) -> Option<bool> {
        let own: Pressure = self.measure.to()?;
        self.again.iter().find_map(|again| {
            let stated = again.is(Qualifier::Gauge) || again.is(Qualifier::Absolute);
            let other = stated.then(|| again.absolute()).flatten()?.pressure;
            let apart = |pressure: Pressure| (pressure.si() - other.si()).abs();
            Some(apart(own + GAUGE_REFERENCE.value()) < apart(own))
        })
    }

    /// Whether a time in it is written in cycles.
    pub fn counts_cycles(&self) -> bool {
        let second = self.second.as_ref().map(|(_, second)| second);
        let own = [Some(&self.measure), second, self.lasting.as_ref()];
        own.into_iter().flatten().any(|measure| measure.unit.counts_cycles())
            || self.again.iter().any(Self::counts_cycles)
    }

    /// The same with its cycles turned into seconds.
    pub fn set_frequency(&mut self, frequency: Frequency) {
        self.measure = self.measure.with_frequency(frequency);
        if let Some((_, second)) = &mut self.second {
            *second = second.with_frequency(frequency);
        }
        if let Some(lasting) = &mut self.lasting {
            *lasting = lasting.with_frequency(frequency);
        }
        for again in &mut self.again {
            again.set_frequency(frequency);
        }
    }

    /// Whether a bound of this side is stated, by a range, by `at least` or `at most`, or by the label.
    pub fn bounds(&self, limit: Limit, by_label: Option<Limit>) -> bool {
        self.is_range()
            || by_label == Some(limit)
            || matches!(
                (self.bound, limit),
                (Some(Bound::Least), Limit::Least) | (Some(Bound::Greatest), Limit::Greatest)
            )
    }

    /// What it measures.
    pub const fn dimension(&self) -> Dimension {
        self.measure.dimension()
    }
}

/// A date, to the month or to the day.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Date {
    /// The year.
    pub year: u16,
    /// The month, 1 to 12.
    pub month: u8,
    /// The day; absent where the date is to the month.
    pub day: Option<u8>,
}

impl Date {
    /// A date, if there is such a day in the calendar.
    pub fn new(year: u16, month: u8, day: Option<u8>) -> Option<Self> {
        let leap = year.is_multiple_of(4) && (!year.is_multiple_of(100) || year.is_multiple_of(400));
        let days = match month {
            1 | 3 | 5 | 7 | 8 | 10 | 12 => 31,
            4 | 6 | 9 | 11 => 30,
            2 if leap => 29,
            2 => 28,
            _ => return None,
        };
        (day.is_none_or(|d| (1..=days).contains(&d))).then_some(Self { year, month, day })
    }

    /// Reads `2029-09` or `2029-09-30`.
    pub fn read(text: &str) -> Option<Self> {
        let date = firstpole_grammar::value::date(text).ok()?;
        Self::new(date.year, date.month, date.day)
    }

    /// Whether its last day lies before `day`.
    pub fn is_before(self, day: Self) -> bool {
        (self.year, self.month, self.day.unwrap_or(31)) < (day.year, day.month, day.day.unwrap_or(1))
    }
}

impl std::fmt::Display for Date {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{:04}-{:02}", self.year, self.month)?;
        self.day.map_or(Ok(()), |day| write!(f, "-{day:02}"))
    }
}

/// An item of a list.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Item {
    /// The text, without quotes.
    pub text: String,
    /// Where it stands.
    pub place: Place,
}

/// A class such as `C2`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Class {
    /// Its letter: C, E, M or S.
    pub letter: char,
    /// Its number.
    pub grade: u8,
    /// Where it stands.
    pub place: Place,
}

impl std::fmt::Display for Class {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{}{}", self.letter, self.grade)
    }
}

/// An operating sequence.
#[derive(Clone, Debug, PartialEq)]
pub struct Sequence {
    /// Its steps, operations and pauses in turn.
    pub steps: Vec<SequenceStep>,
}

/// A step of an operating sequence.
#[derive(Clone, Debug, PartialEq)]
pub enum SequenceStep {
    /// Opening.
    Open,
    /// Closing.
    Close,
    /// Closing followed at once by opening.
    CloseOpen,
    /// A pause.
    Pause(Pause),
}

/// A pause of an operating sequence.
#[derive(Clone, Debug, PartialEq)]
pub struct Pause {
    /// How long; absent where it is written as a letter, or without a unit.
    pub measure: Option<Measure>,
    /// Where it stands.
    pub place: Place,
    /// The number, where no unit was written.
    pub bare: Option<f64>,
}

impl Sequence {
    /// The pauses between its operations.
    pub fn pauses(&self) -> impl Iterator<Item = &Pause> {
        self.steps.iter().filter_map(|step| match step {
            SequenceStep::Pause(pause) => Some(pause),
            _ => None,
        })
    }

    /// The pauses in seconds, where all of them are known.
    pub fn times(&self) -> Option<Vec<Time>> {
        self.pauses().map(|pause| pause.measure.as_ref().and_then(Measure::to)).collect()
    }

    /// Its operations in order.
    pub fn operations(&self) -> impl Iterator<Item = &SequenceStep> {
        self.steps.iter().filter(|step| !matches!(step, SequenceStep::Pause(_)))
    }

    /// Whether it opens, then closes and opens again after the first pause.
    pub fn recloses(&self) -> bool {
        matches!(self.steps.first(), Some(SequenceStep::Open))
            && self.operations().nth(1) == Some(&SequenceStep::CloseOpen)
    }
}

impl std::fmt::Display for Sequence {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        for (at, step) in self.steps.iter().enumerate() {
            if at > 0 {
                f.write_str(" - ")?;
            }
            match step {
                SequenceStep::Open => f.write_str("O")?,
                SequenceStep::Close => f.write_str("C")?,
                SequenceStep::CloseOpen => f.write_str("CO")?,
                SequenceStep::Pause(pause) => match (&pause.measure, pause.bare) {
                    (Some(measure), _) => write!(f, "{measure}")?,
                    (None, Some(number)) => write!(f, "{number}")?,
                    (None, None) => f.write_str("t")?,
                },
            }
        }
        Ok(())
    }
}

/// A gas, or a mixture of gases.
#[derive(Clone, Debug, PartialEq)]
pub struct Mixture {
    /// Its gases; for a pure gas one.
    pub portions: Vec<Share>,
    /// Where it stands.
    pub place: Place,
}

/// One gas of a mixture.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Share {
    /// The word of the list of gases.
    pub gas: &'static str,
    /// Its mole fraction, 0 to 1; absent where the bidder is to state it.
    pub fraction: Option<f64>,
}

impl std::fmt::Display for Mixture {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        for (at, portion) in self.portions.iter().enumerate() {
            if at > 0 {
                f.write_str(" + ")?;
            }
            f.write_str(portion.gas)?;
            if let Some(fraction) = portion.fraction {
                write!(f, " {} %", crate::quantity::rounded(fraction * 100.0, 2))?;
            }
        }
        Ok(())
    }
}

impl Mixture {
    /// The gas, where it is one pure gas.
    pub fn pure(&self) -> Option<&'static str> {
        match self.portions.as_slice() {
            [share] if share.fraction.is_none_or(|f| (f - 1.0).abs() < 1e-9) => Some(share.gas),
            _ => None,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn only_days_of_the_calendar() {
        assert!(Date::read("2028-02-29").is_some());
        assert!(Date::read("2100-02-29").is_none());
        assert!(Date::read("2029-13").is_none());
        assert!(Date::read("2029-04-31").is_none());
    }

    #[test]
    fn a_month_ends_with_its_last_day() {
        let month = Date::read("2028-12").expect("month");
        assert!(!month.is_before(Date::read("2028-12-31").expect("day")));
        assert!(month.is_before(Date::read("2029-01-01").expect("day")));
    }
}
