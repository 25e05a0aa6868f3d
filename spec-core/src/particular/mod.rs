//! The dictionary: the one declaration of every particular.
//!
//! Reading, completion, hover, the schedule, the reference page and the comparison with offers all read these declarations.
//! To add a particular, add one entry to the file of its sheet; nothing else needs to know.

mod kind;
mod lookup;
mod sheet_kind;
pub mod words;

pub mod breaker;
pub mod circuit;
pub mod deviation;
pub mod house_rule;
pub mod infeed;
pub mod offer;
pub mod site;
pub mod system;
pub mod tender;

pub use kind::{Extent, Kind, QuantityKind, Tail};
pub use lookup::{Found, Limit, Lookup, declared, find, nearest, others_with_label};
pub use sheet_kind::{SheetKind, Target};
pub use words::{Word, WordList};

/// The one declaration of a particular: what its label is, how its value is read, and what it means.
#[derive(Debug)]
pub struct Particular {
    /// The sheet that it may stand in.
    pub sheet: SheetKind,
    /// The group of the schedule that it belongs to.
    pub group: &'static str,
    /// Its label.
    pub label: &'static str,
    /// Further accepted wordings (IEC, IEEE, trade).
    pub wordings: &'static [&'static str],
    /// Letter symbols that may stand instead of the label; their case counts.
    pub symbols: &'static [&'static str],
    /// Symbols that the trade uses for two things, which are refused with both readings.
    pub refused: &'static [&'static str],
    /// How its value is read.
    pub kind: Kind,
    /// Which side of the value is the harder one.
    pub sense: Sense,
    /// Whether `from duty` may stand for the value.
    pub from_duty: bool,
    /// Whether nothing checks it: it is carried into the schedule only.
    pub carried: bool,
    /// The clause that it rests on.
    pub basis: &'static str,
    /// What it means, in one sentence.
    pub meaning: &'static str,
}

impl Particular {
    /// Whether this is the very declaration `other`.
    pub fn is(&self, other: &Particular) -> bool {
        std::ptr::eq(self, other)
    }
}

/// Which side of a stated value is the harder requirement.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Sense {
    /// The value itself.
    Exact,
    /// A least value: more is better.
    AtLeast,
    /// A greatest value: less is better.
    AtMost,
    /// Between two bounds.
    Range,
    /// A range that must contain another.
    Contains,
    /// A set, of which each member is meant.
    Set,
    /// A set or sequence that must cover another.
    Covers,
    /// As the particular that it speaks of.
    AsLabel,
}

impl Sense {
    /// The word for it in a schedule.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Exact => "exact",
            Self::AtLeast => "at least",
            Self::AtMost => "at most",
            Self::Range => "range",
            Self::Contains => "range that contains",
            Self::Set => "set",
            Self::Covers => "covers",
            Self::AsLabel => "as the label",
        }
    }
}

/// Declares the particulars of one group: a static for each, and the list of them all.
macro_rules! particulars {
    ($sheet:ident, $group:literal;
     $($(#[$note:meta])* $name:ident = $label:literal {
        $(wordings: [$($wording:literal),* $(,)?],)?
        $(symbols: [$($symbol:literal),* $(,)?],)?
        $(refused: [$($refused:literal),* $(,)?],)?
        kind: $kind:expr,
        sense: $sense:ident,
        $(from_duty: $from_duty:literal,)?
        $(carried: $carried:literal,)?
        basis: $basis:literal,
        meaning: $meaning:literal $(,)?
     })*) => {
        $(
            #[doc = $meaning]
            pub static $name: $crate::particular::Particular = $crate::particular::Particular {
                sheet: $crate::particular::SheetKind::$sheet,
                group: $group,
                label: $label,
                wordings: &[$($($wording),*)?],
                symbols: &[$($($symbol),*)?],
                refused: &[$($($refused),*)?],
                kind: $kind,
                sense: $crate::particular::Sense::$sense,
                from_duty: false $(|| $from_duty)?,
                carried: false $(|| $carried)?,
                basis: $basis,
                meaning: $meaning,
            };
        )*

        /// Every declaration of this group, in the order of the schedule.
        pub static ALL: &[&$crate::particular::Particular] = &[$(&$name),*];
    };
}
pub(crate) use particulars;
