//! The constants of pure gases, read from their table.

use std::sync::LazyLock;

use serde::Deserialize;

#[derive(Clone, Debug, Deserialize)]
struct Row {
    medium: String,
    name: String,
    value: f64,
    meaning: String,
}

/// The constants of a pure gas.
#[derive(Clone, Debug)]
pub struct PureGas {
    /// Its formula.
    pub formula: &'static str,
    /// Molar mass, kg/mol.
    pub(super) molar_mass: f64,
    /// Temperature of the triple point, K.
    pub(super) triple_temperature: f64,
    /// Pressure of the triple point, Pa.
    pub(super) triple_pressure: f64,
    /// Critical temperature, K.
    pub(super) critical_temperature: f64,
    /// Critical pressure, Pa.
    pub(super) critical_pressure: f64,
    /// Coefficients and exponents of the vapour-pressure equation.
    pub(super) vapour: Vec<(f64, f64)>,
    /// Second virial coefficient by powers of 300 K/T, m3/mol.
    pub(super) b: Vec<f64>,
    /// Third virial coefficient by powers of 300 K/T, m6/mol2.
    pub(super) c: Vec<f64>,
    /// Slope of the sublimation line, K.
    pub(super) sublimation_slope: f64,
    /// Density of the liquid near its boiling point, kg/m3; enough for a share by mass.
    pub(super) liquid_density: f64,
    /// Temperatures in which the equation of state holds, K.
    pub(super) temperatures: (f64, f64),
    /// Greatest filling pressure at 20 degC for which it holds, Pa absolute.
    pub(super) highest_filling: f64,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| {
    csv::Reader::from_reader(include_str!("../../../data/gas_coefficients.csv").as_bytes())
        .into_deserialize()
        .flatten()
        .collect()
});

static SF6: LazyLock<PureGas> = LazyLock::new(|| pure("SF6"));

/// Sulphur hexafluoride.
pub fn sf6() -> &'static PureGas {
    &SF6
}

fn pure(medium: &'static str) -> PureGas {
    let own = || ROWS.iter().filter(move |row| row.medium == medium);
    let value = |name: &str| own().find(|row| row.name == name).map_or(f64::NAN, |row| row.value);
    let series = |start: &str| -> Vec<f64> {
        (0..).map_while(|at| own().find(|row| row.name == format!("{start}{at}")).map(|row| row.value)).collect()
    };
    let exponent =
        |row: &Row| row.meaning.split_whitespace().next_back().and_then(|e| e.parse().ok()).unwrap_or(f64::NAN);
    PureGas {
        formula: medium,
        molar_mass: value("molar_mass_kg_mol"),
        triple_temperature: value("T_triple_K"),
        triple_pressure: value("p_triple_Pa"),
        critical_temperature: value("psat_Tc_K"),
        critical_pressure: value("psat_pc_Pa"),
        vapour: own().filter(|row| row.name.starts_with("psat_a")).map(|row| (row.value, exponent(row))).collect(),
        b: series("B"),
        c: series("C"),
        sublimation_slope: value("sublimation_slope_K"),
        liquid_density: value("liquid_density_kg_m3"),
        temperatures: (value("T_lowest_K"), value("T_highest_K")),
        highest_filling: value("highest_filling_Pa"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_constant_is_missing() {
        let gas = sf6();
        let numbers = [
            gas.molar_mass,
            gas.triple_temperature,
            gas.triple_pressure,
            gas.critical_temperature,
            gas.critical_pressure,
            gas.sublimation_slope,
            gas.liquid_density,
            gas.temperatures.0,
            gas.temperatures.1,
            gas.highest_filling,
        ];
        assert!(numbers.iter().all(|n| n.is_finite() && *n > 0.0), "{gas:?}");
        assert_eq!((gas.vapour.len(), gas.b.len(), gas.c.len()), (5, 4, 3));
        assert!(gas.vapour.iter().all(|(a, e)| a.is_finite() && e.is_finite()));
    }
}
