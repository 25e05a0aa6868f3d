//! Operating sequences and classes of break time (IEC 62271-100 5.104, IEEE C37.04).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{ElectricPotential, Frequency, Physical, Time};

/// A sequence O - t - CO - t' - CO of the standard.
#[derive(Clone, Debug, Deserialize)]
pub struct OperatingSequence {
    first_s: f64,
    second_s: f64,
    to_kv: Option<f64>,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

#[derive(Clone, Debug, Deserialize)]
struct BreakTime {
    cycles: f64,
}

static SEQUENCES: LazyLock<Vec<OperatingSequence>> =
    LazyLock::new(|| table::rows(include_str!("../../data/operating_sequences.csv")));
static BREAK_TIMES: LazyLock<Vec<BreakTime>> =
    LazyLock::new(|| table::rows(include_str!("../../data/break_times.csv")));

impl OperatingSequence {
    /// The first pause, t.
    pub fn first(&self) -> Time {
        Time::from_si(self.first_s)
    }

    /// The second pause, t'.
    pub fn second(&self) -> Time {
        Time::from_si(self.second_s)
    }

    /// Whether it is one for this rated voltage.
    pub fn is_for(&self, rated: ElectricPotential) -> bool {
        self.to_kv.is_none_or(|to| rated.si() <= to * 1e3 || same(rated.si(), to * 1e3))
    }
}

/// The sequences of the standard, the easiest first.
pub fn operating_sequences() -> &'static [OperatingSequence] {
    &SEQUENCES
}

/// The classes of break time at a frequency, the shortest first, with their cycles.
pub fn break_times(frequency: Frequency) -> impl DoubleEndedIterator<Item = (f64, Time)> {
    BREAK_TIMES.iter().map(move |row| (row.cycles, Time::from_si(row.cycles / frequency.si())))
}

#[cfg(test)]
pub(super) fn lengths() -> [(&'static str, &'static str, usize); 2] {
    [
        ("operating sequences", include_str!("../../data/operating_sequences.csv"), SEQUENCES.len()),
        ("break times", include_str!("../../data/break_times.csv"), BREAK_TIMES.len()),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn in_order() {
        let sequences = operating_sequences();
        assert!(sequences.is_sorted_by(|a, b| a.first() >= b.first() && a.second() >= b.second()));
        let rated = |kv: f64| ElectricPotential::from_si(kv * 1e3);
        let last = sequences.last().expect("a row");
        assert!(last.is_for(rated(52.0)) && !last.is_for(rated(72.5)));
        let times: Vec<f64> = break_times(Frequency::from_si(50.0)).map(|(_, t)| t.si()).collect();
        assert_eq!(times, [0.04, 0.06, 0.1]);
    }
}
