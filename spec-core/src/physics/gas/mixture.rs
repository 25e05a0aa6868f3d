//! Mixtures: density by a virial equation with the excess of the Peng-Robinson equation, dew point and flash by the latter.

use super::constants::{Gas, gas};
use super::cubic::{Attraction, Cubic};
use super::pure::{GasFault, MOLAR_GAS_CONSTANT as R, molar_density, root, virial_pressure};
use crate::quantity::{MassDensity, Physical, Pressure, ThermodynamicTemperature};
use crate::standards::REFERENCE_TEMPERATURE;

/// A mixture of gases with its mole fractions.
#[derive(Clone, Debug)]
pub struct GasMixture {
    gases: Vec<&'static Gas>,
    fractions: Vec<f64>,
    cubic: Cubic,
}

/// Below this nothing is looked for: what has not condensed here does not limit a breaker, K.
const COLDEST: f64 = 150.0;
/// Above this no gas is told of, K.
const HOTTEST: f64 = 345.0;
/// The highest filling that the mixture model is told of, Pa absolute at 20 degC (range of the pure gases' fits).
const HIGHEST_FILLING: f64 = 1.6e6;
/// Step in which the dew point is looked for, K: below it a filling stays condensed, so that a wide step loses nothing.
const STEP: f64 = 8.0;

/// A mixture below its dew point, at constant volume.
#[derive(Clone, Debug, PartialEq)]
pub struct MixtureState {
    /// The pressure, Pa.
    pub pressure: Pressure,
    /// Share of the moles that is vapour.
    pub vapour_fraction: f64,
    /// Mole fraction of the gas of the highest critical temperature in the vapour.
    pub condensable_in_vapour: f64,
    /// Share of that gas that is liquid.
    pub condensed_share: f64,
}

impl GasMixture {
    /// A mixture by mole fractions, which need not be in any order. None where a gas or a pair of gases is not known.
    pub fn of(portions: &[(&str, f64)]) -> Option<Self> {
        // One order for any order of writing, so that rounding cannot tell them apart.
        let mut sorted: Vec<(&'static Gas, f64)> = portions
            .iter()
            .map(|(formula, fraction)| gas(formula).map(|gas| (gas, *fraction)))
            .collect::<Option<_>>()?;
        sorted.sort_by_key(|(gas, _)| gas.formula);
        let sum: f64 = sorted.iter().map(|(_, fraction)| fraction).sum();
        if sum <= 0.0 || !sum.is_finite() {
            return None;
        }
        let gases: Vec<&'static Gas> = sorted.iter().map(|(gas, _)| *gas).collect();
        let cubic = Cubic::of(&gases)?;
        Some(Self { gases, fractions: sorted.iter().map(|(_, fraction)| fraction / sum).collect(), cubic })
    }

    /// Molar mass, kg/mol.
    pub fn molar_mass(&self) -> f64 {
        self.gases.iter().zip(&self.fractions).map(|(gas, y)| gas.molar_mass * y).sum()
    }

    /// Shares by mass, by formula.
    pub fn mass_shares(&self) -> Vec<(&'static str, f64)> {
        let mass = self.molar_mass();
        self.gases.iter().zip(&self.fractions).map(|(gas, y)| (gas.formula, gas.molar_mass * y / mass)).collect()
    }

    /// Second and third virial coefficient: B = sum y_i y_j B_ij with
    /// B_ij = (B_ii + B_jj)/2 + (b_ij - a_ij/RT) - (B_ii,PR + B_jj,PR)/2, C = (sum y_i C_i^(1/3))^3.
    fn virial(&self, t: f64) -> (f64, f64) {
        let attraction = self.cubic.attraction(t);
        let rt = R * t;
        let b = self.cubic.covolumes();
        let own: Vec<(f64, f64, f64)> = self
            .gases
            .iter()
            .zip(b)
            .enumerate()
            .map(|(at, (gas, b))| {
                let a = attraction.pair(at, at);
                let cubic = b - a / rt;
                let (second, third) =
                    gas.pure.as_ref().map_or_else(|| (cubic, b * b + 2.0 * a * b / rt), |pure| pure.virial(t));
                (second, third, cubic)
            })
            .collect();
        let mut second = 0.0;
        for (i, ((yi, (bi, _, ci)), covolume_i)) in self.fractions.iter().zip(&own).zip(b).enumerate() {
            for (j, ((yj, (bj, _, cj)), covolume_j)) in self.fractions.iter().zip(&own).zip(b).enumerate() {
                let excess = 0.5 * (covolume_i + covolume_j) - attraction.pair(i, j) / rt - 0.5 * (ci + cj);
                second += yi * yj * (0.5 * (bi + bj) + excess);
            }
        }
        let third: f64 = self.fractions.iter().zip(&own).map(|(y, (_, c, _))| y * c.cbrt()).sum();
        (second, third.powi(3))
    }

    /// Density of a filling.
    pub fn density(&self, filling: Pressure, at: ThermodynamicTemperature) -> Result<MassDensity, GasFault> {
        let (p, t) = (filling.si(), within(at)?);
        if p <= 0.0 {
            return Err(GasFault::NoPressure);
        }
        let too_high = GasFault::FillingTooHigh { bound: HIGHEST_FILLING };
        let rho = molar_density(p, t, self.virial(t)).ok_or(too_high)?;
        if virial_pressure(rho, REFERENCE_TEMPERATURE.kelvin(), self.virial(REFERENCE_TEMPERATURE.kelvin()))
            > HIGHEST_FILLING * (1.0 + 1e-6)
        {
            return Err(too_high);
        }
        Ok(MassDensity::from_si(rho * self.molar_mass()))
    }

    /// Pressure of the gas at a temperature and constant density, as if it did not condense.
    pub fn pressure(&self, density: MassDensity, at: ThermodynamicTemperature) -> Result<Pressure, GasFault> {
        let t = within(at)?;
        Ok(Pressure::from_si(virial_pressure(density.si() / self.molar_mass(), t, self.virial(t))))
    }

    /// Molar volume of a filling by the Peng-Robinson equation, m3/mol.
    pub fn molar_volume(&self, filling: Pressure, at: ThermodynamicTemperature) -> Result<f64, GasFault> {
        let (p, t) = (filling.si(), within(at)?);
        if p <= 0.0 {
            return Err(GasFault::NoPressure);
        }
        if p > HIGHEST_FILLING * (1.0 + 1e-6) {
            return Err(GasFault::FillingTooHigh { bound: HIGHEST_FILLING });
        }
        let (_, z) = self.cubic.compressibility(&self.cubic.attraction(t), &self.fractions, p);
        Ok(z * R * t / p)
    }

    /// Density of a filling by the Peng-Robinson equation.
    pub fn cubic_density(&self, filling: Pressure, at: ThermodynamicTemperature) -> Result<MassDensity, GasFault> {
        self.molar_volume(filling, at).map(|v| MassDensity::from_si(self.molar_mass() / v))
    }

    /// Where a filling of this molar volume begins to condense: the highest temperature at which a liquid is more stable. None
    /// where nothing condenses above -120 degC.
    pub fn dew_point(&self, molar_volume: f64) -> Option<ThermodynamicTemperature> {
        let mut high = REFERENCE_TEMPERATURE.kelvin();
        if self.condenses(molar_volume, high) {
            return Some(ThermodynamicTemperature::from_si(high));
        }
        while high > COLDEST {
            let low = high - STEP;
            if self.condenses(molar_volume, low) {
                let (mut cold, mut warm) = (low, high);
                while warm - cold > 1e-5 {
                    let middle = 0.5 * (cold + warm);
                    if self.condenses(molar_volume, middle) { cold = middle } else { warm = middle }
                }
                return Some(ThermodynamicTemperature::from_si(0.5 * (cold + warm)));
            }
            high = low;
        }
        None
    }

    fn condenses(&self, v: f64, t: f64) -> bool {
        let attraction = self.cubic.attraction(t);
        let p = self.cubic.pressure(&attraction, &self.fractions, v);
        // Below zero the equation has left the gas: it has long condensed.
        p <= 0.0 || self.cubic.incipient_liquid(&attraction, &self.fractions, p, p * v / (R * t)).is_some()
    }

    /// The highest filling at 20 degC that does not condense at a temperature, Pa absolute.
    pub fn highest_filling(&self, lowest: ThermodynamicTemperature) -> Result<Pressure, GasFault> {
        let t = within(lowest)?;
        let reference = REFERENCE_TEMPERATURE.value();
        let condenses = |p: f64| self.molar_volume(Pressure::from_si(p), reference).is_ok_and(|v| self.condenses(v, t));
        if !condenses(HIGHEST_FILLING) {
            return Err(GasFault::FillingTooHigh { bound: HIGHEST_FILLING });
        }
        let (mut low, mut high) = (0.0, HIGHEST_FILLING);
        while high - low > 1.0 {
            let middle = 0.5 * (low + high);
            if condenses(middle) { high = middle } else { low = middle }
        }
        Ok(Pressure::from_si(0.5 * (low + high)))
    }

    /// A filling of this molar volume below its dew point: the pressure at which liquid and vapour together take up that volume.
    /// None where it has not condensed.
    pub fn flash(&self, molar_volume: f64, at: ThermodynamicTemperature) -> Option<MixtureState> {
        let t = at.si();
        if !self.condenses(molar_volume, t) {
            return None;
        }
        let attraction = self.cubic.attraction(t);
        let heavy =
            self.gases.iter().enumerate().max_by(|a, b| a.1.cubic.0.total_cmp(&b.1.cubic.0)).map(|(at, _)| at)?;
        let split = |p: f64| self.split(&attraction, p);
        // The volume of the two phases falls with the pressure; in logarithms the pressure is nearly straight.
        let ideal = R * t / molar_volume;
        let off = |ln_p: f64| (split(ln_p.exp()).volume / molar_volume).ln();
        let ln_p = root(off, (0.2 * ideal).ln(), (1.2 * ideal).ln());
        let state = split(ln_p.exp());
        let in_vapour = state.vapour.get(heavy).copied().unwrap_or(0.0);
        let all = self.fractions.get(heavy).copied().unwrap_or(1.0);
        Some(MixtureState {
            pressure: Pressure::from_si(ln_p.exp()),
            vapour_fraction: state.fraction,
            condensable_in_vapour: in_vapour,
            condensed_share: 1.0 - state.fraction * in_vapour / all,
        })
    }

    /// Liquid and vapour at a pressure: successive substitution around the Rachford-Rice equation.
    fn split(&self, attraction: &Attraction, p: f64) -> Split {
        let z = &self.fractions;
        let (_, gas) = self.cubic.compressibility(attraction, z, p);
        let Some(mut x) = self.cubic.incipient_liquid(attraction, z, p, gas) else {
            return Split { volume: gas * R * attraction.temperature() / p, fraction: 1.0, vapour: z.clone() };
        };
        let mut y = z.clone();
        let mut fraction = 1.0;
        for _ in 0..2000 {
            let (liquid_z, _) = self.cubic.compressibility(attraction, &x, p);
            let (_, vapour_z) = self.cubic.compressibility(attraction, &y, p);
            let liquid = self.cubic.ln_fugacity(attraction, &x, p, liquid_z);
            let vapour = self.cubic.ln_fugacity(attraction, &y, p, vapour_z);
            let k: Vec<f64> = liquid.iter().zip(&vapour).map(|(l, v)| (l - v).exp()).collect();
            fraction = rachford_rice(z, &k);
            let next: Vec<f64> = z.iter().zip(&k).map(|(z, k)| z / (1.0 + fraction * (k - 1.0))).collect();
            let moved: f64 = next.iter().zip(&x).map(|(a, b)| (a - b).abs()).sum();
            y = next.iter().zip(&k).map(|(x, k)| x * k).collect();
            x = next;
            if moved < 1e-13 {
                break;
            }
        }
        let (liquid_z, _) = self.cubic.compressibility(attraction, &x, p);
        let (_, vapour_z) = self.cubic.compressibility(attraction, &y, p);
        let rt_over_p = R * attraction.temperature() / p;
        let volume = rt_over_p * (fraction * vapour_z + (1.0 - fraction) * liquid_z);
        Split { volume, fraction, vapour: y }
    }

    /// The trade's rule for the gas of the highest critical temperature: it condenses where its partial pressure, falling with the
    /// temperature, meets the vapour pressure of the pure gas. By the Ambrose-Walton equation; none for gases without its factor.
    pub fn partial_pressure_rule(&self, filling: Pressure) -> Option<ThermodynamicTemperature> {
        let (gas, y) = self.gases.iter().zip(&self.fractions).find(|(gas, _)| gas.ambrose_walton.is_some())?;
        let omega = gas.ambrose_walton?;
        let (tc, pc, _) = gas.cubic;
        let partial = |t: f64| y * filling.si() * t / REFERENCE_TEMPERATURE.kelvin();
        let off = |t: f64| (partial(t) / (pc * ambrose_walton(t / tc, omega).exp())).ln();
        (off(COLDEST) > 0.0 && off(REFERENCE_TEMPERATURE.kelvin()) < 0.0)
            .then(|| ThermodynamicTemperature::from_si(root(off, COLDEST, REFERENCE_TEMPERATURE.kelvin())))
    }

    /// The same mixture without interaction between its gases, for the far end of a band.
    #[must_use]
    pub fn without_interaction(&self) -> Self {
        Self { cubic: self.cubic.without_interaction(), ..self.clone() }
    }

    /// Whether its dew point is an estimate only: one of its gases has no equation of state of its own.
    pub fn is_estimate(&self) -> bool {
        self.gases.iter().any(|gas| gas.pure.is_none())
    }

    /// The triple point of the gas of the highest critical temperature, where it is known: below it that gas comes down as frost.
    pub fn triple_of_heaviest(&self) -> Option<ThermodynamicTemperature> {
        let heavy = self.gases.iter().max_by(|a, b| a.cubic.0.total_cmp(&b.cubic.0))?;
        heavy.pure.as_ref().map(|pure| ThermodynamicTemperature::from_si(pure.triple_temperature))
    }

    /// The formulas of its gases.
    pub fn formulas(&self) -> impl Iterator<Item = &'static str> {
        self.gases.iter().map(|gas| gas.formula)
    }
}

#[derive(Debug)]
struct Split {
    volume: f64,
    fraction: f64,
    vapour: Vec<f64>,
}

fn within(at: ThermodynamicTemperature) -> Result<f64, GasFault> {
    let t = at.si();
    if t < COLDEST {
        Err(GasFault::TemperatureOutside { bound: COLDEST })
    } else if t > HOTTEST {
        Err(GasFault::TemperatureOutside { bound: HOTTEST })
    } else {
        Ok(t)
    }
}

/// The vapour fraction of a feed `z` with ratios `k`: the root of sum z (k - 1)/(1 + f (k - 1)) between 0 and 1, by halving, which
/// cannot leave the interval.
fn rachford_rice(z: &[f64], k: &[f64]) -> f64 {
    let sum = |f: f64| z.iter().zip(k).map(|(z, k)| z * (k - 1.0) / (1.0 + f * (k - 1.0))).sum::<f64>();
    let (mut low, mut high) = (0.0, 1.0);
    if sum(high) >= 0.0 {
        return 1.0;
    }
    if sum(low) <= 0.0 {
        return 0.0;
    }
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if sum(middle) > 0.0 { low = middle } else { high = middle }
    }
    0.5 * (low + high)
}

/// Logarithm of the reduced vapour pressure by Ambrose and Walton 1989: f0 + omega f1 + omega^2 f2 with x = 1 - Tr.
fn ambrose_walton(reduced: f64, omega: f64) -> f64 {
    let x = 1.0 - reduced;
    let term = |[a, b, c, d]: [f64; 4]| (a * x + b * x.powf(1.5) + c * x.powf(2.5) + d * x.powi(5)) / reduced;
    let f0 = term([-5.97616, 1.29874, -0.60394, -1.06841]);
    let f1 = term([-5.03365, 1.11505, -5.41217, -7.46628]);
    let f2 = term([-0.64771, 2.41539, -4.26979, 3.25259]);
    f0 + omega * f1 + omega * omega * f2
}

#[cfg(test)]
mod tests {
    use super::*;

    fn celsius(number: f64) -> ThermodynamicTemperature {
        ThermodynamicTemperature::from_si(number + 273.15)
    }

    fn mpa(number: f64) -> Pressure {
        Pressure::from_si(number * 1e6)
    }

    fn dew(portions: &[(&str, f64)], filling: f64) -> f64 {
        let mixture = GasMixture::of(portions).expect("a mixture");
        let v = mixture.molar_volume(mpa(filling), celsius(20.0)).expect("a volume");
        mixture.dew_point(v).expect("a dew point").si() - 273.15
    }

    /// Results of the gas basis, sections 2.2 and 2.3 (computed with CoolProp 8.0.0, Peng-Robinson).
    #[test]
    fn dew_points_of_the_gas_basis() {
        for (portions, filling, expected) in [
            (&[("SF6", 0.6), ("N2", 0.4)][..], 0.6, -47.3),
            (&[("SF6", 0.6), ("N2", 0.4)], 0.7, -43.2),
            (&[("SF6", 0.5), ("CF4", 0.5)], 0.8, -43.2),
            (&[("C4F7N", 0.06), ("CO2", 0.94)], 0.7, -27.2),
            (&[("C4F7N", 0.035), ("O2", 0.13), ("CO2", 0.835)], 1.0, -30.3),
        ] {
            assert!(
                (dew(portions, filling) - expected).abs() < 0.06,
                "{portions:?} {filling}: {}",
                dew(portions, filling)
            );
        }
    }

    #[test]
    fn the_band_of_an_estimate() {
        let mixture = GasMixture::of(&[("C4F7N", 0.06), ("CO2", 0.94)]).expect("a mixture");
        let rule = mixture.partial_pressure_rule(mpa(0.7)).expect("the rule").si() - 273.15;
        assert!((rule + 28.5).abs() < 0.06, "{rule}");
        let far = mixture.without_interaction();
        let v = far.molar_volume(mpa(0.7), celsius(20.0)).expect("a volume");
        let end = far.dew_point(v).expect("a dew point").si() - 273.15;
        assert!((end + 25.3).abs() < 0.06, "{end}");
        assert!(mixture.is_estimate());
    }

    #[test]
    fn unknown_pairs_and_dry_air() {
        assert!(GasMixture::of(&[("SF6", 0.5), ("C5F10O", 0.5)]).is_none());
        let air = GasMixture::of(&[("N2", 0.79), ("O2", 0.21)]).expect("air");
        let v = air.molar_volume(mpa(0.8), celsius(20.0)).expect("a volume");
        assert_eq!(air.dew_point(v), None);
    }

    #[test]
    fn the_order_of_writing_does_not_matter() {
        let a = dew(&[("C4F7N", 0.05), ("O2", 0.1), ("CO2", 0.85)], 0.8);
        let b = dew(&[("CO2", 0.85), ("C4F7N", 0.05), ("O2", 0.1)], 0.8);
        assert_eq!(a.to_bits(), b.to_bits());
    }

    #[test]
    fn the_highest_filling_is_the_one_that_begins_to_condense() {
        let mixture = GasMixture::of(&[("SF6", 0.6), ("N2", 0.4)]).expect("a mixture");
        let filling = mixture.highest_filling(celsius(-45.0)).expect("a filling").si() / 1e6;
        assert!((dew(&[("SF6", 0.6), ("N2", 0.4)], filling) + 45.0).abs() < 1e-3);
    }
}
