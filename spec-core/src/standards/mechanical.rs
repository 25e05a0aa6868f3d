//! Earthquake levels, terminal loads, zinc coatings (IEEE 693, IEC 62271-100, ISO 1461 and 9223).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{Acceleration, ElectricCurrent, ElectricPotential, Force, Length, Physical};

/// Standard gravity, m/s2 (exact by definition).
const GRAVITY: f64 = 9.806_65;

#[derive(Clone, Debug, Deserialize)]
pub(super) struct SeismicRow {
    level: String,
    design_g: f64,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct LoadRow {
    from_kv: f64,
    to_kv: f64,
    from_a: f64,
    to_a: f64,
    longitudinal_n: f64,
    transverse_n: f64,
    vertical_n: f64,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct ZincRow {
    category: String,
    least_um: f64,
}

static SEISMIC: LazyLock<Vec<SeismicRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/seismic_levels.csv")));
static LOADS: LazyLock<Vec<LoadRow>> = LazyLock::new(|| table::rows(include_str!("../../data/terminal_loads.csv")));
static ZINC: LazyLock<Vec<ZincRow>> = LazyLock::new(|| table::rows(include_str!("../../data/zinc_coatings.csv")));

#[cfg(test)]
pub(super) fn counts() -> (usize, usize, usize) {
    (SEISMIC.len(), LOADS.len(), ZINC.len())
}

fn gravities(number: f64) -> Acceleration {
    Acceleration::from_si(number * GRAVITY)
}

/// The design level of a qualification.
pub fn seismic_level(word: &str) -> Option<Acceleration> {
    SEISMIC.iter().find(|row| row.level == word).map(|row| gravities(row.design_g))
}

/// The lowest level whose design acceleration is not below `acceleration`.
pub fn seismic_level_for(acceleration: Acceleration) -> Option<(&'static str, Acceleration)> {
    SEISMIC
        .iter()
        .map(|row| (row.level.as_str(), gravities(row.design_g)))
        .find(|(_, design)| *design >= acceleration || same(design.si(), acceleration.si()))
}

/// The static terminal loads that the standard gives as examples.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TerminalLoads {
    /// Horizontal, along the terminal.
    pub longitudinal: Force,
    /// Horizontal, across it.
    pub transverse: Force,
    /// Vertical, up or down.
    pub vertical: Force,
}

/// The static terminal loads for these ratings.
pub fn terminal_loads(rated: ElectricPotential, current: ElectricCurrent) -> Option<TerminalLoads> {
    let (kv, amperes) = (rated.si() / 1e3, current.si());
    let within = |from: f64, value: f64, to: f64| {
        (from < value || same(from, value) || from == 0.0) && (value < to || same(value, to))
    };
    LOADS.iter().find(|row| within(row.from_kv, kv, row.to_kv) && within(row.from_a, amperes, row.to_a)).map(|row| {
        TerminalLoads {
            longitudinal: Force::from_si(row.longitudinal_n),
            transverse: Force::from_si(row.transverse_n),
            vertical: Force::from_si(row.vertical_n),
        }
    })
}

/// The zinc that steel wants in air of this corrosivity; none in mild air.
pub fn zinc_coating(category: &str) -> Option<Length> {
    ZINC.iter().find(|row| row.category == category).map(|row| Length::from_si(row.least_um * 1e-6))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn levels_of_earthquakes() {
        assert_eq!(seismic_level_for(gravities(0.25)).map(|(word, _)| word), Some("moderate"));
        assert_eq!(seismic_level_for(gravities(0.26)).map(|(word, _)| word), Some("high"));
        assert_eq!(seismic_level_for(gravities(0.6)), None);
    }

    #[test]
    fn loads_grow_with_voltage_and_current() {
        let at = |kv: f64, a: f64| {
            terminal_loads(ElectricPotential::from_si(kv * 1e3), ElectricCurrent::from_si(a))
                .map(|l| l.longitudinal.si())
        };
        assert_eq!(at(145.0, 2500.0), Some(1250.0));
        assert_eq!(at(145.0, 2000.0), Some(1000.0));
        assert_eq!(at(36.0, 1250.0), Some(500.0));
        assert_eq!(at(200.0, 2000.0), None);
    }

    #[test]
    fn zinc_by_corrosivity() {
        assert_eq!(zinc_coating("C3"), None);
        assert_eq!(zinc_coating("C5").map(|l| (l.si() * 1e6).round()), Some(86.0));
    }
}
