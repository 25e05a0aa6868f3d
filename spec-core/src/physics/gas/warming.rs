//! Global warming potentials, each with the table that it is from.

use std::sync::LazyLock;

use serde::Deserialize;

#[derive(Clone, Debug, Deserialize)]
struct Row {
    gas: String,
    gwp: f64,
    basis: String,
    document: String,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| {
    csv::Reader::from_reader(include_str!("../../../data/gwp.csv").as_bytes()).into_deserialize().flatten().collect()
});

/// A potential over 100 years with the document that it is from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WarmingBasis {
    /// kg of CO2 for each kg of the gas.
    pub potential: f64,
    /// The document.
    pub document: &'static str,
}

/// The potential of a gas by a table, in the words of the particular `GWP basis`; none where the table does not have the gas.
pub fn warming_potential(gas: &str, basis: &str) -> Option<WarmingBasis> {
    ROWS.iter()
        .find(|row| row.gas == gas && (row.basis == basis || row.basis == "any"))
        .map(|row| WarmingBasis { potential: row.gwp, document: &row.document })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// No row is lost in reading, each has a source and a status, and no gas stands twice under one basis.
    #[test]
    fn every_row_has_a_source() {
        let mut reader = csv::Reader::from_reader(include_str!("../../../data/gwp.csv").as_bytes());
        let head = reader.headers().expect("a head").clone();
        let at = |wanted: &str| head.iter().position(|name| name == wanted).expect("a column");
        let records: Vec<_> = reader.records().map(|row| row.expect("a row")).collect();
        assert_eq!(records.len(), ROWS.len());
        for row in &records {
            assert!(row[at("source")].len() > 5 && !row[at("status")].is_empty(), "{row:?}");
        }
        for (n, row) in ROWS.iter().enumerate() {
            assert!(
                !ROWS.iter().skip(n + 1).any(|other| (&other.gas, &other.basis) == (&row.gas, &row.basis)),
                "{row:?}"
            );
        }
    }

    /// 24 300 (EU 2024/573), 23 500 (40 CFR 98), 22 800 (EU 517/2014), as the sources of the table have them.
    #[test]
    fn sulphur_hexafluoride_by_three_tables() {
        for (basis, expected) in [("EU 2024/573", 24_300.0), ("40 CFR 98", 23_500.0), ("EU 517/2014", 22_800.0)] {
            assert_eq!(warming_potential("SF6", basis).expect("a potential").potential, expected);
        }
        assert_eq!(warming_potential("CO2", "AR6").expect("by definition").potential, 1.0);
        assert_eq!(warming_potential("C4F7N", "AR4"), None);
    }
}
