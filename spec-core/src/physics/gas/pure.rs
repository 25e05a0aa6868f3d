//! A pure gas at constant density.

use super::PureGas;
use super::constants::Frost;
use crate::quantity::{MassDensity, Physical, Pressure, Ratio, ThermodynamicTemperature};
use crate::standards::REFERENCE_TEMPERATURE;

/// Molar gas constant, J/(mol K), exact since the SI of 2019 to the digits written.
pub(super) const MOLAR_GAS_CONSTANT: f64 = 8.314_462_618;

/// Up to this deviation, percent, a vapour-pressure equation is told of: the dew point then moves by less than 0.05 K.
const USABLE_DEVIATION: f64 = 0.1;

/// The density of the highest filling may come back with an error of rounding.
const DENSITY_ROUNDING: f64 = 1.0 + 1e-8;

/// Why a state cannot be told.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum GasFault {
    /// The filling is above what the equation of state holds for.
    FillingTooHigh {
        /// The bound, Pa absolute at 20 degC.
        bound: f64,
    },
    /// The pressure is not above zero.
    NoPressure,
    /// The temperature is outside of the range of the equation of state.
    TemperatureOutside {
        /// The bound that was left, K.
        bound: f64,
    },
    /// Its vapour-pressure equation is not good enough to be told of.
    NoVapourPressure,
    /// The gas is saturated at the temperature of filling: it cannot be filled as gas to this pressure.
    Saturated {
        /// The pressure of saturation, Pa.
        bound: f64,
    },
}

impl std::fmt::Display for GasFault {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        match self {
            Self::FillingTooHigh { bound } => {
                write!(f, "above {} MPa abs at 20 degC the equation of state does not hold", bound / 1e6)
            }
            Self::NoVapourPressure => f.write_str("the vapour pressure of this gas is not known well enough"),
            Self::NoPressure => f.write_str("the absolute pressure is not above zero"),
            Self::TemperatureOutside { bound } => {
                write!(f, "beyond {:.0} degC the equation of state does not hold", bound - 273.15)
            }
            Self::Saturated { bound } => {
                write!(f, "it cannot be filled as gas above {:.3} MPa abs at this temperature", bound / 1e6)
            }
        }
    }
}

impl std::error::Error for GasFault {}

/// What a gas becomes when it condenses.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Phase {
    /// Liquid.
    Liquid,
    /// Frost, below the triple point.
    Frost,
}

/// Where a filling begins to condense.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Condensation {
    /// The temperature.
    pub temperature: ThermodynamicTemperature,
    /// What it becomes.
    pub phase: Phase,
}

/// A filling below its dew point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TwoPhase {
    /// Share of the mass that is liquid or frost.
    pub condensed: Ratio,
    /// Density of the vapour that is left.
    pub vapour: MassDensity,
}

impl PureGas {
    /// Density of a filling: the root of p = rho R T (1 + B rho + C rho^2) that is a gas.
    pub fn density(&self, filling: Pressure, at: ThermodynamicTemperature) -> Result<MassDensity, GasFault> {
        let (p, t) = (filling.si(), at.si());
        self.within(t)?;
        if p <= 0.0 {
            return Err(GasFault::NoPressure);
        }
        if t < self.critical_temperature {
            let saturated = self.saturation(t);
            if p > saturated {
                return Err(GasFault::Saturated { bound: saturated });
            }
        }
        let density = MassDensity::from_si(self.density_of_gas(p, t)?);
        if self.pressure_of_gas(density.si(), REFERENCE_TEMPERATURE.kelvin()) > self.highest_filling * (1.0 + 1e-9) {
            return Err(GasFault::FillingTooHigh { bound: self.highest_filling });
        }
        Ok(density)
    }

    /// Pressure at a temperature and constant density; below the dew point that of saturation.
    pub fn pressure(&self, density: MassDensity, at: ThermodynamicTemperature) -> Result<Pressure, GasFault> {
        let t = at.si();
        self.within(t)?;
        self.within_density(density)?;
        let gas = self.pressure_of_gas(density.si(), t);
        let floor = self.saturation_floor.get((t - self.temperatures.0) as usize);
        let dry = t >= self.critical_temperature || floor.is_some_and(|floor| gas < *floor);
        Ok(Pressure::from_si(if dry { gas } else { gas.min(self.saturation(t)) }))
    }

    /// Where a filling of this density begins to condense.
    pub fn dew_point(&self, density: MassDensity) -> Result<Condensation, GasFault> {
        // In logarithms both sides are nearly straight, and the pressure of the gas falls by less than that of saturation, so that
        // there is one root.
        let excess = |t: f64| (self.pressure_of_gas(density.si(), t) / self.saturation(t)).ln();
        if self.vapour_deviation > USABLE_DEVIATION {
            return Err(GasFault::NoVapourPressure);
        }
        self.within_density(density)?;
        let (low, high) = (self.temperatures.0, self.critical_temperature.min(self.temperatures.1));
        if excess(low) < 0.0 || excess(high) > 0.0 {
            return Err(GasFault::TemperatureOutside { bound: if excess(low) < 0.0 { low } else { high } });
        }
        let temperature = root(excess, low, high);
        let phase = if temperature < self.triple_temperature { Phase::Frost } else { Phase::Liquid };
        Ok(Condensation { temperature: ThermodynamicTemperature::from_si(temperature), phase })
    }

    /// Pressure of saturation at a temperature up to 20 degC, at which fillings are stated: over the liquid, and over the frost
    /// below the triple point.
    pub fn saturation_pressure(&self, at: ThermodynamicTemperature) -> Result<Pressure, GasFault> {
        let t = at.si();
        if self.vapour_deviation > USABLE_DEVIATION {
            return Err(GasFault::NoVapourPressure);
        }
        // The liquid's line begins at the triple point; a line over the frost holds as far as the equation of state does.
        let lowest = if self.frost.is_some() { self.temperatures.0 } else { self.triple_temperature };
        let highest = REFERENCE_TEMPERATURE.kelvin().min(self.critical_temperature);
        match t {
            t if t < lowest => Err(GasFault::TemperatureOutside { bound: lowest }),
            t if t > highest => Err(GasFault::TemperatureOutside { bound: highest }),
            _ => Ok(()),
        }?;
        Ok(Pressure::from_si(self.saturation(t)))
    }

    /// Density of the saturated vapour at a temperature.
    pub fn saturated_density(&self, at: ThermodynamicTemperature) -> Result<MassDensity, GasFault> {
        self.within(at.si())?;
        let saturated = self.saturation_pressure(at)?;
        let density = MassDensity::from_si(self.density_of_gas(saturated.si(), at.si())?);
        if self.reference_pressure(density).si() > self.highest_filling {
            return Err(GasFault::FillingTooHigh { bound: self.highest_filling });
        }
        Ok(density)
    }

    /// A filling at a temperature: how much of it is condensed, and what vapour is left. The share of the liquid is
    /// (1 - rho_g/rho)/(1 - rho_g/rho_l).
    pub fn two_phase(&self, density: MassDensity, at: ThermodynamicTemperature) -> Result<TwoPhase, GasFault> {
        self.within_density(density)?;
        if at.si() >= self.critical_temperature
            || self.pressure_of_gas(density.si(), at.si()) <= self.saturation(at.si())
        {
            self.within(at.si())?;
            return Ok(TwoPhase { condensed: Ratio::from_si(0.0), vapour: density });
        }
        let vapour = self.saturated_density(at)?;
        let condensed = (1.0 - vapour.si() / density.si()) / (1.0 - vapour.si() / self.liquid_density);
        Ok(TwoPhase { condensed: Ratio::from_si(condensed.max(0.0)), vapour })
    }

    /// The pressure that a density has at 20 degC, as rated levels are stated.
    pub fn reference_pressure(&self, density: MassDensity) -> Pressure {
        Pressure::from_si(self.pressure_of_gas(density.si(), REFERENCE_TEMPERATURE.kelvin()))
    }

    /// The highest filling, as a pressure at 20 degC, that does not condense at a temperature.
    pub fn highest_filling(&self, lowest: ThermodynamicTemperature) -> Result<Pressure, GasFault> {
        self.saturated_density(lowest).map(|density| self.reference_pressure(density))
    }

    fn within(&self, t: f64) -> Result<(), GasFault> {
        let (low, high) = self.temperatures;
        if t < low {
            Err(GasFault::TemperatureOutside { bound: low })
        } else if t > high {
            Err(GasFault::TemperatureOutside { bound: high })
        } else {
            Ok(())
        }
    }

    /// Beyond the highest filling the series turns over, and what it gives there looks like a result.
    fn within_density(&self, density: MassDensity) -> Result<(), GasFault> {
        let rho = density.si();
        if rho <= 0.0 {
            Err(GasFault::NoPressure)
        } else if rho <= self.highest_density * DENSITY_ROUNDING {
            Ok(())
        } else {
            Err(GasFault::FillingTooHigh { bound: self.highest_filling })
        }
    }

    /// Pressure of saturation over the liquid, ln(p/pc) = (Tc/T) sum a (1 - T/Tc)^e, and over the frost below the triple point.
    pub(super) fn saturation(&self, t: f64) -> f64 {
        let series = |terms: &[(f64, f64)], x: f64| {
            let (x, root) = (x.max(0.0), x.max(0.0).sqrt());
            terms.iter().map(|(a, e)| a * power(x, root, *e)).sum::<f64>()
        };
        match &self.frost {
            Some(frost) if t < self.triple_temperature => {
                let exponent = match frost {
                    Frost::Slope(slope) => -slope * (1.0 / t - 1.0 / self.triple_temperature),
                    Frost::Series(terms) => {
                        self.triple_temperature / t * series(terms, 1.0 - t / self.triple_temperature)
                    }
                };
                self.triple_pressure * exponent.exp()
            }
            _ => {
                let sum = series(&self.vapour, 1.0 - t / self.critical_temperature);
                self.critical_pressure * (self.critical_temperature / t * sum).exp()
            }
        }
    }

    /// Second and third virial coefficient, m3/mol and m6/mol2.
    pub(super) fn virial(&self, t: f64) -> (f64, f64) {
        let x = 300.0 / t;
        let series = |c: &[f64]| c.iter().rev().fold(0.0, |sum, c| sum * x + c);
        (series(&self.b), series(&self.c))
    }

    /// Pressure of the gas, Pa, of a density in kg/m3, as if it did not condense.
    fn pressure_of_gas(&self, density: f64, t: f64) -> f64 {
        virial_pressure(density / self.molar_mass, t, self.virial(t))
    }

    /// Density of the gas, kg/m3.
    pub(super) fn density_of_gas(&self, p: f64, t: f64) -> Result<f64, GasFault> {
        let fault = GasFault::FillingTooHigh { bound: self.highest_filling };
        molar_density(p, t, self.virial(t)).map(|rho| rho * self.molar_mass).ok_or(fault)
    }
}

/// x^e, by multiplication where e is a whole or half number, as most exponents of vapour-pressure equations are.
fn power(x: f64, root: f64, e: f64) -> f64 {
    let halves = 2.0 * e;
    if halves.fract() == 0.0 { root.powi(halves as i32) } else { x.powf(e) }
}

/// The root of a falling function between two temperatures, to 1e-9 K: false position with halved weights (Illinois).
pub(super) fn root(f: impl Fn(f64) -> f64, low: f64, high: f64) -> f64 {
    let (mut a, mut b) = (low, high);
    let (mut fa, mut fb) = (f(a), f(b));
    let mut side = 0_i8;
    for _ in 0..200 {
        let t = (a * fb - b * fa) / (fb - fa);
        if !t.is_finite() || (b - a).abs() < 1e-9 {
            break;
        }
        let ft = f(t);
        if ft == 0.0 {
            return t;
        }
        if (ft > 0.0) == (fa > 0.0) {
            (a, fa) = (t, ft);
            if side == -1 {
                fb *= 0.5;
            }
            side = -1;
        } else {
            (b, fb) = (t, ft);
            if side == 1 {
                fa *= 0.5;
            }
            side = 1;
        }
        if ft.abs() < 1e-14 {
            return t;
        }
    }
    0.5 * (a + b)
}

/// Molar density of a gas with virial coefficients (B, C), mol/m3, by Newton's method from the ideal gas; none where the truncated
/// series has turned over.
pub(super) fn molar_density(p: f64, t: f64, (b, c): (f64, f64)) -> Option<f64> {
    let ideal = p / (MOLAR_GAS_CONSTANT * t);
    let mut rho = ideal;
    for _ in 0..50 {
        let residual = rho * (1.0 + b * rho + c * rho * rho) - ideal;
        let slope = 1.0 + 2.0 * b * rho + 3.0 * c * rho * rho;
        if slope <= 0.0 {
            return None;
        }
        let step = residual / slope;
        rho -= step;
        if step.abs() <= 1e-14 * rho.abs() {
            break;
        }
    }
    Some(rho)
}

/// Pressure of a gas with virial coefficients, Pa, at a molar density.
pub(super) fn virial_pressure(rho: f64, t: f64, (b, c): (f64, f64)) -> f64 {
    rho * MOLAR_GAS_CONSTANT * t * (1.0 + b * rho + c * rho * rho)
}

#[cfg(test)]
mod tests {
    use super::super::sf6;
    use super::*;

    fn mpa(number: f64) -> Pressure {
        Pressure::from_si(number * 1e6)
    }

    fn celsius(number: f64) -> ThermodynamicTemperature {
        ThermodynamicTemperature::from_si(number + 273.15)
    }

    fn dew(filling: f64) -> f64 {
        let density = sf6().density(mpa(filling), celsius(20.0)).expect("a density");
        sf6().dew_point(density).expect("a dew point").temperature.si() - 273.15
    }

    /// Dew points of fillings at 20 degC, computed with CoolProp 8.0.0 (gas basis, section 4).
    #[test]
    fn dew_points() {
        for (filling, expected) in [(0.5, -36.7), (0.6, -31.1), (0.7, -26.2)] {
            assert!((dew(filling) - expected).abs() < 0.06, "{filling}: {}", dew(filling));
        }
    }

    /// Highest filling for a lowest temperature, computed with CoolProp 8.0.0 (gas basis, section 2.1).
    #[test]
    fn highest_fillings() {
        for (t, expected) in [(-45.0, 0.373), (-40.0, 0.446), (-30.0, 0.622), (-20.0, 0.840), (0.0, 1.407)] {
            let filling = sf6().highest_filling(celsius(t)).expect("a filling").si() / 1e6;
            assert!((filling - expected).abs() < 0.0006, "{t}: {filling}");
        }
    }

    /// 0.6 MPa: 6.5 % liquid and 0.565 MPa left at -33 degC, 13.0 % and 0.529 at -35, 27.6 % and 0.446 at -40 (gas basis).
    #[test]
    fn what_is_left_below_the_dew_point() {
        let density = sf6().density(mpa(0.6), celsius(20.0)).expect("a density");
        for (t, share, left) in [(-33.0, 0.065, 0.565), (-35.0, 0.130, 0.529), (-40.0, 0.276, 0.446)] {
            let state = sf6().two_phase(density, celsius(t)).expect("a state");
            assert!((state.condensed.value - share).abs() < 0.003, "{t}: {}", state.condensed.value);
            assert!((sf6().reference_pressure(state.vapour).si() / 1e6 - left).abs() < 0.001, "{t}");
        }
        assert_eq!(sf6().two_phase(density, celsius(-20.0)).expect("a state").condensed.value, 0.0);
    }

    #[test]
    fn the_highest_filling_is_the_one_that_begins_to_condense() {
        for t in [-45.0, -30.0, -10.0] {
            let filling = sf6().highest_filling(celsius(t)).expect("a filling").si() / 1e6;
            assert!((dew(filling) - t).abs() < 1e-6, "{t}");
        }
    }

    #[test]
    fn out_of_range_is_refused_with_its_bound() {
        assert_eq!(sf6().density(mpa(1.7), celsius(20.0)), Err(GasFault::FillingTooHigh { bound: 1.6e6 }));
        assert!(sf6().density(mpa(1.6), celsius(20.0)).is_ok());
        assert_eq!(sf6().density(mpa(0.0), celsius(20.0)), Err(GasFault::NoPressure));
        assert!(matches!(sf6().density(mpa(3.0), celsius(20.0)), Err(GasFault::Saturated { .. })));
        assert_eq!(sf6().highest_filling(celsius(-70.0)), Err(GasFault::TemperatureOutside { bound: 205.0 }));
        let density = MassDensity::from_si(40.0);
        assert!(matches!(sf6().pressure(density, celsius(80.0)), Err(GasFault::TemperatureOutside { .. })));
    }

    /// Above the highest filling nothing is told, however the density came about: at 250 kg/m3 the series has turned over, and a
    /// dew point of it would be far off and look sound.
    #[test]
    fn no_state_is_told_beyond_the_highest_density() {
        let too_high = GasFault::FillingTooHigh { bound: 1.6e6 };
        for rho in [124.7, 130.0, 160.0, 200.0, 250.0, 300.0, 1000.0, f64::NAN] {
            let density = MassDensity::from_si(rho);
            assert_eq!(sf6().dew_point(density).expect_err("a fault"), too_high, "{rho}");
            assert_eq!(sf6().pressure(density, celsius(-10.0)).expect_err("a fault"), too_high, "{rho}");
            assert_eq!(sf6().two_phase(density, celsius(-10.0)).expect_err("a fault"), too_high, "{rho}");
        }
        for rho in [0.0, -1.0] {
            assert_eq!(sf6().dew_point(MassDensity::from_si(rho)), Err(GasFault::NoPressure));
        }
        let highest = sf6().density(mpa(1.6), celsius(20.0)).expect("a density");
        assert!(sf6().dew_point(highest).is_ok() && sf6().two_phase(highest, celsius(-10.0)).is_ok());
    }

    /// The bound that is looked up never calls a saturated gas dry.
    #[test]
    fn the_floor_of_saturation_lies_below_it() {
        for t in (0..1100).map(|n| 206.0 + 0.1 * f64::from(n)) {
            let density = MassDensity::from_si(60.0);
            let pressure = sf6().pressure(density, ThermodynamicTemperature::from_si(t)).expect("a pressure").si();
            let expected = sf6().pressure_of_gas(60.0, t).min(sf6().saturation(t));
            assert!((pressure - expected).abs() < 1e-6, "{t}");
        }
    }

    /// Below 0.3141 MPa abs the gas comes down as frost (gas basis, section 2.1).
    #[test]
    fn frost_below_the_triple_point() {
        let phase = |filling: f64| {
            let density = sf6().density(mpa(filling), celsius(20.0)).expect("a density");
            sf6().dew_point(density).expect("a dew point").phase
        };
        assert_eq!(phase(0.313), Phase::Frost);
        assert_eq!(phase(0.316), Phase::Liquid);
    }
}
