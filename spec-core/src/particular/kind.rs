//! How the value of a particular is read.

use super::WordList;
use crate::quantity::{Dimension, Qualifier};

/// How the value of a particular is read.
#[derive(Debug)]
pub enum Kind {
    /// A number with its unit.
    Quantity(QuantityKind),
    /// A number without a unit.
    Ratio,
    /// A whole number.
    Count,
    /// A year.
    Year,
    /// Words of a list; several may be joined by `or` where `alternatives` is set.
    Words {
        /// The list.
        list: &'static WordList,
        /// Whether several may be joined by `or`.
        alternatives: bool,
    },
    /// Words of a list, or a quantity.
    WordsOrQuantity(&'static WordList, QuantityKind),
    /// Words of a list, or a quoted name.
    WordsOrText(&'static WordList),
    /// A date, or words of a list.
    DateOrWords(&'static WordList),
    /// Yes or no.
    YesNo,
    /// A date.
    Date,
    /// Any text, quoted or not.
    Text,
    /// A list of texts, each of which may be quoted.
    Texts,
    /// A list of names of sheets or bays.
    Names,
    /// A list of words.
    WordSet(&'static WordList),
    /// A list of standards.
    Standards,
    /// A list of labels.
    Labels,
    /// Classes such as `C2, M2`.
    Classes,
    /// An operating sequence.
    Sequence,
    /// A gas or a mixture; several may be joined by `or`.
    Gas,
    /// A list of gases.
    Gases,
    /// A condition of a house rule.
    Expression,
    /// A kind of finding and a text.
    Outcome,
    /// As the particular that the label speaks of.
    AsLabel,
}

/// How a quantity is read.
#[derive(Clone, Copy, Debug)]
pub struct QuantityKind {
    /// What it may measure; the usual one first.
    pub dimensions: &'static [Dimension],
    /// The units that authors use, the usual one first; also the unit that a repair proposes.
    pub units: &'static [&'static str],
    /// The kind of value that is meant (rms, peak, direct, alternating), where the particular fixes it.
    pub qualifier: Option<Qualifier>,
    /// What may or must follow the value.
    pub tail: Tail,
    /// Whether one value, a range, or a sum is written.
    pub extent: Extent,
    /// Whether `none` may stand for it.
    pub none: bool,
}

/// What may follow a quantity.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tail {
    /// Nothing.
    Nothing,
    /// `at VOLTAGE`: the voltage that a power was multiplied with.
    AtVoltage,
    /// `at TEMPERATURE`.
    AtTemperature,
    /// `for TIME`: the duration that belongs to it.
    ForTime,
    /// The reference of a pressure, and `at TEMPERATURE` where it is not 20 degC.
    PressureReference,
    /// `phase-to-phase` or `phase-to-earth`.
    DividingVoltage,
    /// `DC` or `AC`.
    Supply,
}

/// Whether one value, a range, or a sum of two is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Extent {
    /// One value, or bounds.
    Value,
    /// A range.
    Range,
    /// A value, or a sum such as `1 050 + 170 kV`.
    Sum,
}

impl QuantityKind {
    /// A plain quantity of one dimension.
    pub const fn of(dimensions: &'static [Dimension], units: &'static [&'static str]) -> Self {
        Self { dimensions, units, qualifier: None, tail: Tail::Nothing, extent: Extent::Value, none: false }
    }

    /// The same, of one kind of value (rms, peak ...).
    #[must_use]
    pub const fn as_(mut self, qualifier: Qualifier) -> Self {
        self.qualifier = Some(qualifier);
        self
    }

    /// The same, followed by `tail`.
    #[must_use]
    pub const fn with(mut self, tail: Tail) -> Self {
        self.tail = tail;
        self
    }

    /// The same, written as a range or a sum.
    #[must_use]
    pub const fn extending(mut self, extent: Extent) -> Self {
        self.extent = extent;
        self
    }

    /// The same, for which `none` may stand.
    #[must_use]
    pub const fn or_none(mut self) -> Self {
        self.none = true;
        self
    }
}
