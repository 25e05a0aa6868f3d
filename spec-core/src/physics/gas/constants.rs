//! The constants of the gases, read from their tables.

use std::sync::LazyLock;

use serde::Deserialize;

use crate::standards::REFERENCE_TEMPERATURE;

#[derive(Clone, Debug, Deserialize)]
struct Row {
    medium: String,
    name: String,
    value: f64,
    meaning: String,
}

#[derive(Clone, Debug, Deserialize)]
struct Interaction {
    first: String,
    second: String,
    kij: f64,
}

/// The constants of one gas.
#[derive(Clone, Debug)]
pub struct Gas {
    /// Its formula.
    pub formula: &'static str,
    /// Molar mass, kg/mol.
    pub(super) molar_mass: f64,
    /// Critical temperature, K, pressure, Pa, and acentric factor of the Peng-Robinson equation.
    pub(super) cubic: (f64, f64, f64),
    /// Acentric factor of the Ambrose-Walton vapour-pressure equation, for gases of which no better one is known.
    pub(super) ambrose_walton: Option<f64>,
    /// What is known of the pure gas by measurement; absent where only estimates are.
    pub(super) pure: Option<PureGas>,
}

/// The constants of a pure gas whose equation of state is known.
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
    /// Greatest deviation of that equation, percent.
    pub(super) vapour_deviation: f64,
    /// Pressures of saturation, Pa, at whole kelvins from the lowest temperature of the equation of state on. Saturation rises with
    /// the temperature, so that the one at the kelvin below is a bound that costs nothing to look up.
    pub(super) saturation_floor: Vec<f64>,
    /// The line over the frost; absent where nothing below the triple point is asked for.
    pub(super) frost: Option<Frost>,
    /// Second virial coefficient by powers of 300 K/T, m3/mol.
    pub(super) b: Vec<f64>,
    /// Third virial coefficient by powers of 300 K/T, m6/mol2.
    pub(super) c: Vec<f64>,
    /// Density of the liquid near its boiling point, kg/m3; enough for a share by mass.
    pub(super) liquid_density: f64,
    /// Temperatures in which the equation of state holds, K.
    pub(super) temperatures: (f64, f64),
    /// Greatest filling pressure at 20 degC for which it holds, Pa absolute.
    pub(super) highest_filling: f64,
    /// Density of that filling, kg/m3: the bound of the equation of state at every temperature.
    pub(super) highest_density: f64,
}

/// The vapour pressure over the frost.
#[derive(Clone, Debug)]
pub(super) enum Frost {
    /// ln(p/pt) = -slope (1/T - 1/Tt), slope in K.
    Slope(f64),
    /// ln(p/pt) = (Tt/T) sum a (1 - T/Tt)^e.
    Series(Vec<(f64, f64)>),
}

/// The gases of the table.
const FORMULAS: [&str; 8] = ["SF6", "CO2", "CF3I", "N2", "O2", "CF4", "C4F7N", "C5F10O"];

static GASES: LazyLock<Vec<Gas>> = LazyLock::new(|| {
    let text = include_str!("../../../data/gas_coefficients.csv");
    let rows: Vec<Row> = csv::Reader::from_reader(text.as_bytes()).into_deserialize().flatten().collect();
    FORMULAS.into_iter().map(|formula| read(formula, &rows)).collect()
});

static INTERACTIONS: LazyLock<Vec<Interaction>> = LazyLock::new(|| {
    let text = include_str!("../../../data/gas_interactions.csv");
    csv::Reader::from_reader(text.as_bytes()).into_deserialize().flatten().collect()
});

/// The constants of a gas.
pub fn gas(formula: &str) -> Option<&'static Gas> {
    GASES.iter().find(|gas| gas.formula == formula)
}

/// The constants of a pure gas whose equation of state is known.
pub fn pure(formula: &str) -> Option<&'static PureGas> {
    gas(formula)?.pure.as_ref()
}

/// The interaction of two gases in the Peng-Robinson equation; none where nothing is known of the pair.
pub(super) fn interaction(first: &str, second: &str) -> Option<f64> {
    if first == second {
        return Some(0.0);
    }
    let of = |a: &str, b: &str| INTERACTIONS.iter().find(|row| row.first == a && row.second == b).map(|row| row.kij);
    of(first, second).or_else(|| of(second, first))
}

fn read(formula: &'static str, rows: &[Row]) -> Gas {
    let own = || rows.iter().filter(move |row| row.medium == formula);
    let value = |name: &str| own().find(|row| row.name == name).map(|row| row.value);
    // A constant that is missing shows as not a number; a test looks for that.
    let needed = |name: &str| value(name).unwrap_or(f64::NAN);
    let powers = |start: &str| -> Vec<f64> {
        (0..).map_while(|at| own().find(|row| row.name == format!("{start}{at}")).map(|row| row.value)).collect()
    };
    let series = |start: &str| -> Vec<(f64, f64)> {
        own().filter(|row| row.name.starts_with(start)).map(|row| (row.value, exponent(&row.meaning))).collect()
    };
    let molar_mass = needed("molar_mass_kg_mol");
    let frost = value("sublimation_slope_K")
        .map(Frost::Slope)
        .or_else(|| Some(series("sublimation_a")).filter(|s| !s.is_empty()).map(Frost::Series));
    let mut pure = value("psat_Tc_K").map(|critical_temperature| PureGas {
        formula,
        molar_mass,
        triple_temperature: needed("T_triple_K"),
        triple_pressure: needed("p_triple_Pa"),
        critical_temperature,
        critical_pressure: needed("psat_pc_Pa"),
        vapour: series("psat_a"),
        vapour_deviation: needed("psat_deviation_percent"),
        saturation_floor: Vec::new(),
        frost,
        b: powers("B"),
        c: powers("C"),
        liquid_density: needed("liquid_density_kg_m3"),
        temperatures: (needed("T_lowest_K"), needed("T_highest_K")),
        highest_filling: needed("highest_filling_Pa"),
        highest_density: f64::NAN,
    });
    if let Some(pure) = &mut pure {
        pure.highest_density =
            pure.density_of_gas(pure.highest_filling, REFERENCE_TEMPERATURE.kelvin()).unwrap_or(f64::NAN);
        let (low, _) = pure.temperatures;
        let kelvins = (pure.critical_temperature - low).max(0.0) as u32;
        pure.saturation_floor = (0..kelvins).map(|n| pure.saturation(low + f64::from(n))).collect();
    }
    Gas {
        formula,
        molar_mass,
        cubic: (needed("PR_Tc_K"), needed("PR_pc_Pa"), needed("PR_omega")),
        ambrose_walton: value("AW_omega"),
        pure,
    }
}

/// The exponent of a coefficient, as its meaning has it: `exponent 2.5; ...`.
fn exponent(meaning: &str) -> f64 {
    meaning
        .strip_prefix("exponent ")
        .and_then(|rest| rest.split(';').next())
        .and_then(|number| number.trim().parse().ok())
        .unwrap_or(f64::NAN)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// No row is lost in reading, each has a source and a status, and each is of a gas of the table.
    #[test]
    fn every_row_has_a_source() {
        let coefficients = include_str!("../../../data/gas_coefficients.csv");
        let interactions = include_str!("../../../data/gas_interactions.csv");
        for text in [coefficients, interactions] {
            let mut reader = csv::Reader::from_reader(text.as_bytes());
            let head = reader.headers().expect("a head").clone();
            let column = |wanted: &str| head.iter().position(|name| name == wanted).expect("a column");
            let (source, status) = (column("source"), column("status"));
            for row in reader.records() {
                let row = row.expect("a row");
                assert!(row[source].len() >= 5, "{row:?}");
                assert!(["V", "F", "M", "MF", "D"].contains(&&row[status]), "{row:?}");
            }
        }
        for row in csv::Reader::from_reader(coefficients.as_bytes()).into_deserialize::<Row>() {
            let row = row.expect("a row");
            assert!(FORMULAS.contains(&row.medium.as_str()) && row.value.is_finite(), "{row:?}");
        }
        for row in csv::Reader::from_reader(interactions.as_bytes()).into_deserialize::<Interaction>() {
            let row = row.expect("a row");
            assert!(gas(&row.first).is_some() && gas(&row.second).is_some() && row.kij.is_finite(), "{row:?}");
        }
    }

    #[test]
    fn no_constant_is_missing() {
        for gas in GASES.iter() {
            let (tc, pc, omega) = gas.cubic;
            assert!([gas.molar_mass, tc, pc, omega].iter().all(|n| n.is_finite()), "{gas:?}");
            let Some(pure) = &gas.pure else {
                assert!(gas.ambrose_walton.is_some(), "{}", gas.formula);
                continue;
            };
            let numbers = [
                pure.triple_temperature,
                pure.triple_pressure,
                pure.critical_pressure,
                pure.liquid_density,
                pure.temperatures.0,
                pure.temperatures.1,
                pure.highest_filling,
                pure.highest_density,
                pure.vapour_deviation,
            ];
            assert!(numbers.iter().all(|n| n.is_finite() && *n > 0.0), "{pure:?}");
            assert_eq!((pure.b.len(), pure.c.len()), (4, 3), "{}", gas.formula);
            assert!(pure.vapour.len() >= 4 && pure.vapour.iter().all(|(a, e)| a.is_finite() && e.is_finite()));
        }
        assert!(
            pure("SF6").is_some_and(|gas| gas.frost.is_some()) && pure("CO2").is_some_and(|gas| gas.frost.is_some())
        );
    }

    #[test]
    fn interactions_go_both_ways() {
        assert_eq!(interaction("CO2", "C4F7N"), Some(0.05));
        assert_eq!(interaction("C4F7N", "CO2"), Some(0.05));
        assert_eq!(interaction("SF6", "SF6"), Some(0.0));
        assert_eq!(interaction("SF6", "C5F10O"), None);
    }
}
