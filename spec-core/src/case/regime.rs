//! Which families of standards a text cites.

use crate::sheet::Item;
use crate::standards::Regime;

/// Which families of standards a text cites.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub struct Regimes {
    /// A standard of the IEC, or a joint one.
    pub iec: bool,
    /// A standard of the IEEE (or ANSI C37), or a joint one.
    pub ieee: bool,
    /// The standard of generator circuit-breakers.
    pub generator: bool,
    /// A national standard with a prefix of its own, which is carried and not judged.
    pub national: bool,
}

impl Regimes {
    /// The families of a list of standards. Where nothing is cited, nothing can be held against it, and both count.
    pub fn of(standards: &[Item]) -> Self {
        let mut regimes = Self::default();
        for item in standards {
            let text = item.text.to_ascii_uppercase();
            let joint = text.contains("IEC/IEEE") || text.contains("IEEE/IEC");
            let ieee = joint || text.starts_with("IEEE") || text.starts_with("ANSI") || text.starts_with("C37");
            regimes.ieee |= ieee;
            regimes.iec |= joint || text.starts_with("IEC") || text.starts_with("62271");
            regimes.national |=
                !ieee && !text.contains("IEC") && !text.starts_with("62271") && !text.starts_with("ISO");
            regimes.generator |= text.contains("37-013") || text.contains("C37.013");
        }
        if !regimes.iec && !regimes.ieee {
            regimes.iec = true;
            regimes.ieee = true;
        }
        regimes
    }

    /// The families as the tables name them.
    pub fn families(self) -> Vec<Regime> {
        let iec = self.iec.then_some(Regime::Iec);
        iec.into_iter().chain(self.ieee.then_some(Regime::Ieee)).collect()
    }

    /// Whether only standards of the IEEE are cited.
    pub const fn only_ieee(self) -> bool {
        self.ieee && !self.iec
    }

    /// Whether only standards of the IEC are cited.
    pub const fn only_iec(self) -> bool {
        self.iec && !self.ieee
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::source::{BlockId, Place};

    fn regimes(texts: &[&str]) -> Regimes {
        let place = Place::new(BlockId(0), firstpole_grammar::Span::default());
        Regimes::of(&texts.iter().map(|t| Item { text: (*t).to_owned(), place }).collect::<Vec<_>>())
    }

    #[test]
    fn families_of_standards() {
        assert!(regimes(&["IEC 62271-1:2017", "ISO 9223"]).only_iec());
        assert!(regimes(&["ANSI C37.06", "IEEE C37.04:2018"]).only_ieee());
        let joint = regimes(&["IEC/IEEE 62271-37-013:2021"]);
        assert!(joint.iec && joint.ieee && joint.generator);
        assert!(regimes(&[]).iec && regimes(&[]).ieee);
        assert!(regimes(&["IS 13118"]).national);
    }
}
