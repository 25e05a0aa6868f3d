//! The gas in the cold: density and dew point of each level, and what is left at the lowest ambient temperature.

use super::{Figure, NamedFigure, lowest_ambient, named, percent};
use crate::case::Case;
use crate::particular::{Particular, breaker, tender};
use crate::physics::gas::{GasFault, GasMixture, MixtureState, Phase, PureGas, TwoPhase, pure, warming_potential};
use crate::quantity::{
    Mass, MassDensity, Physical, Pressure, Ratio, TemperatureInterval, ThermodynamicTemperature, Volume, rounded,
    significant,
};
use crate::sheet::{Mixture, Statement};
use crate::source::Place;
use crate::standards::REFERENCE_TEMPERATURE;

/// A level of the gas.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Level {
    /// The rated filling.
    Filling,
    /// The alarm.
    Alarm,
    /// The minimum functional level, or the lockout where that is all there is.
    Minimum,
}

impl Level {
    /// The word for it.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Filling => "filling",
            Self::Alarm => "alarm level",
            Self::Minimum => "minimum functional level",
        }
    }
}

/// The gas of a filling.
#[derive(Clone, Debug)]
pub enum Medium {
    /// A pure gas.
    Pure(&'static PureGas),
    /// A mixture.
    Mixture(GasMixture),
}

/// How sure a dew point is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Certainty {
    /// A measured equation of state: to a tenth of a degree.
    Measured,
    /// A model of mixtures: to about 1 K.
    Modelled,
    /// No measured truth is known: a band, from the trade's rule to the model without interaction.
    Estimate {
        /// The cold end: by partial pressure, as the trade reckons.
        cold: ThermodynamicTemperature,
        /// The warm end.
        warm: ThermodynamicTemperature,
    },
}

/// A dew point with what it becomes and how sure it is.
#[derive(Clone, Debug)]
pub struct DewPoint {
    /// The temperature with its working.
    pub figure: Figure<ThermodynamicTemperature>,
    /// What the gas becomes.
    pub phase: Phase,
    /// How sure it is.
    pub certainty: Certainty,
}

/// A level with its state.
#[derive(Clone, Debug)]
pub struct LevelState {
    /// Which level.
    pub level: Level,
    /// Where its value stands.
    pub place: Place,
    /// As it was written.
    pub written: String,
    /// The absolute pressure at its reference temperature.
    pub pressure: Pressure,
    /// The density, or why it cannot be told.
    pub density: Result<Figure<MassDensity>, GasFault>,
    /// The dew point; absent where the gas does not condense above -120 degC, or nothing can be told.
    pub dew_point: Option<DewPoint>,
}

/// One filling of a case, where the gas is one that is known.
#[derive(Clone, Debug, Default)]
pub struct GasDuty {
    /// The gas.
    pub medium: Option<Medium>,
    /// How messages call it.
    pub name: String,
    /// The levels that are stated.
    pub levels: Vec<LevelState>,
    /// The lowest temperature of the gas: of the air, raised by heaters that declare by how much.
    pub lowest: Option<Figure<ThermodynamicTemperature>>,
    /// The highest filling that does not condense there, Pa abs at 20 degC.
    pub highest_filling: Option<Figure<Pressure>>,
    /// The condensed share of the filling there.
    pub condensed: Option<Figure<Ratio>>,
    /// The pressure at 20 degC that the remaining vapour of a pure gas stands for.
    pub remaining: Option<Figure<Pressure>>,
    /// A mixture below its dew point there.
    pub mixture_state: Option<MixtureState>,
    /// The mass of gas in one breaker.
    pub mass: Option<Figure<Mass>>,
    /// What that mass is worth in CO2.
    pub co2_equivalent: Option<Figure<Mass>>,
}

/// The particulars of one filling.
struct Filling {
    gas: &'static Particular,
    levels: [&'static Particular; 4],
    heated: bool,
}

static INTERRUPTER: Filling = Filling {
    gas: &breaker::INSULATING_GAS,
    levels: [
        &breaker::RATED_FILLING_PRESSURE,
        &breaker::ALARM_PRESSURE,
        &breaker::LOCKOUT_PRESSURE,
        &breaker::MINIMUM_FUNCTIONAL_PRESSURE,
    ],
    heated: true,
};

static OTHER: Filling = Filling {
    gas: &breaker::OTHER_COMPARTMENTS_GAS,
    levels: [
        &breaker::OTHER_COMPARTMENTS_FILLING_PRESSURE,
        &breaker::OTHER_COMPARTMENTS_ALARM_PRESSURE,
        &breaker::OTHER_COMPARTMENTS_LOCKOUT_PRESSURE,
        &breaker::OTHER_COMPARTMENTS_MINIMUM_FUNCTIONAL_PRESSURE,
    ],
    heated: false,
};

impl GasDuty {
    /// The filling of the interrupter.
    pub(super) fn of(case: &Case<'_>) -> Self {
        Self::read(case, &INTERRUPTER)
    }

    /// The filling of other compartments.
    pub(super) fn of_others(case: &Case<'_>) -> Self {
        Self::read(case, &OTHER)
    }

    fn read(case: &Case<'_>, filling: &Filling) -> Self {
        let Some((medium, name)) = medium(case, filling.gas) else { return Self::default() };
        let mut duty = Self { lowest: lowest_of_gas(case, filling.heated), name, ..Self::default() };
        let [full, alarm, lockout, minimum] = filling.levels;
        let minimum = if case.breaker.mentions(minimum) { minimum } else { lockout };
        for (level, particular) in [(Level::Filling, full), (Level::Alarm, alarm), (Level::Minimum, minimum)] {
            duty.levels.extend(level_state(case, &medium, level, particular));
        }
        duty.in_the_cold(&medium);
        if filling.heated {
            duty.mass(case, &medium);
        }
        duty.medium = Some(medium);
        duty
    }

    fn in_the_cold(&mut self, medium: &Medium) {
        let Some(lowest) = &self.lowest else { return };
        let t = lowest.value;
        self.highest_filling = medium.highest_filling(t).ok().map(|pressure| {
            Figure::new(
                pressure,
                "filling at 20 degC that begins to condense at the lowest temperature",
                medium.basis(),
            )
            .given("lowest temperature", celsius(t))
            .shown(absolute(pressure))
        });
        let Some(filling) = self.levels.iter().find(|state| state.level == Level::Filling) else { return };
        let Ok(density) = &filling.density else { return };
        match medium {
            Medium::Pure(gas) => {
                let Ok(TwoPhase { condensed, vapour }) = gas.two_phase(density.value, t) else { return };
                self.condensed = Some(
                    Figure::new(condensed, "(1 - rho_g/rho)/(1 - rho_g/rho_l)", medium.basis())
                        .from("rho", density)
                        .given("rho_g", vapour.show())
                        .given("temperature", celsius(t))
                        .shown(percent(condensed.value)),
                );
                let left = gas.reference_pressure(vapour);
                self.remaining = Some(
                    Figure::new(left, "pressure at 20 degC of the remaining vapour", medium.basis())
                        .given("rho_g", vapour.show())
                        .shown(absolute(left)),
                );
            }
            Medium::Mixture(mixture) => {
                let reference = REFERENCE_TEMPERATURE.value();
                let Ok(volume) = mixture.molar_volume(filling.pressure, reference) else { return };
                self.mixture_state = mixture.flash(volume, t);
                let share = self.mixture_state.as_ref().map_or(0.0, |state| 1.0 - state.vapour_fraction);
                self.condensed = Some(
                    Figure::new(
                        Ratio::from_si(share),
                        "moles in the liquid, by the flash at constant volume",
                        medium.basis(),
                    )
                    .given("temperature", celsius(t))
                    .shown(percent(share)),
                );
            }
        }
    }

    /// The mass as it is stated, else of the volume and the density; and what it is worth in CO2, by the table that the tender
    /// names or its jurisdiction implies.
    fn mass(&mut self, case: &Case<'_>, medium: &Medium) {
        let stated = case.breaker.quantity::<Mass>(&breaker::GAS_MASS).map(|mass| Figure::stated("m", &mass));
        let density = self.level(Level::Filling).and_then(|state| state.density.as_ref().ok());
        let of_volume = case.breaker.quantity::<Volume>(&breaker::GAS_VOLUME).zip(density).map(|(volume, density)| {
            let mass = Mass::from_si(density.value.si() * volume.value.si());
            Figure::new(mass, "m = rho V", medium.basis()).from("rho", density).with("V", &volume)
        });
        self.mass = stated.or(of_volume);
        let Some(mass) = &self.mass else { return };
        let named = case.tender.word(&tender::GWP_BASIS).map(|(word, _)| word);
        let implied = match crate::rules::gas_law::jurisdiction(case).map(|(word, _)| word) {
            Some("EU") => Some("EU 2024/573"),
            Some("California") => Some("40 CFR 98"),
            _ => None,
        };
        let Some(basis) = named.or(implied) else { return };
        let mut potential = 0.0;
        let mut document = "";
        for (gas, share) in medium.mass_shares() {
            let Some(found) = warming_potential(gas, basis) else { return };
            potential += share * found.potential;
            if found.potential > 1.0 || document.is_empty() {
                document = found.document;
            }
        }
        let equivalent = Mass::from_si(mass.value.si() * potential);
        self.co2_equivalent = Some(
            Figure::new(equivalent, "m GWP", "IPCC reports, as the law takes them over")
                .from("m", mass)
                .given("GWP", format!("{} ({document})", significant(potential, 5))),
        );
    }

    /// A level that is stated.
    pub fn level(&self, level: Level) -> Option<&LevelState> {
        self.levels.iter().find(|state| state.level == level)
    }

    /// The pressure of a level at each of these temperatures, at constant density; below the dew point of a pure gas that of
    /// saturation, and of a mixture that of the two phases together. Temperatures out of range are left out.
    pub fn curve(
        &self,
        level: Level,
        temperatures: &[ThermodynamicTemperature],
    ) -> Vec<(ThermodynamicTemperature, Pressure)> {
        let (Some(medium), Some(state)) = (&self.medium, self.level(level)) else { return Vec::new() };
        temperatures.iter().filter_map(|t| medium.pressure(state, *t).map(|p| (*t, p))).collect()
    }

    pub(super) fn figures(&self) -> Vec<NamedFigure> {
        let density = self.level(Level::Filling).and_then(|state| state.density.as_ref().ok());
        let dew = |level| self.level(level).and_then(|state| state.dew_point.as_ref()).map(|dew| &dew.figure);
        vec![
            named("gas_density", "kg/m3", density),
            named("gas_dew_point_filling", "K", dew(Level::Filling)),
            named("gas_dew_point_alarm", "K", dew(Level::Alarm)),
            named("gas_dew_point_minimum", "K", dew(Level::Minimum)),
            named("gas_highest_filling", "Pa", self.highest_filling.as_ref()),
            named("gas_liquid_share", "1", self.condensed.as_ref()),
            named("gas_remaining_pressure", "Pa", self.remaining.as_ref()),
            named("gas_mass", "kg", self.mass.as_ref()),
            named("gas_co2_equivalent", "kg", self.co2_equivalent.as_ref()),
        ]
    }
}

impl Medium {
    /// The medium of a gas as it was written: a pure gas, a mixture with its shares, or dry air.
    pub fn of(written: &Mixture) -> Option<Self> {
        /// Dry air by its two gases (common practice: argon counts as nitrogen).
        const DRY_AIR: [(&str, f64); 2] = [("N2", 0.79), ("O2", 0.21)];
        match written.pure() {
            Some("dry air") => GasMixture::of(&DRY_AIR).map(Self::Mixture),
            Some(formula) => pure(formula).map(Self::Pure),
            None => {
                let portions: Option<Vec<(&str, f64)>> = written
                    .portions
                    .iter()
                    .flat_map(|portion| match portion.gas {
                        "dry air" => DRY_AIR.map(|(gas, y)| portion.fraction.map(|f| (gas, f * y))).to_vec(),
                        gas => vec![portion.fraction.map(|f| (gas, f))],
                    })
                    .collect();
                GasMixture::of(&portions?).map(Self::Mixture)
            }
        }
    }

    /// What its figures rest on.
    pub fn basis(&self) -> &'static str {
        match self {
            Self::Pure(_) => {
                "equation of state fitted to CoolProp 8.0.0, published vapour-pressure equation (coefficients from memory)"
            }
            Self::Mixture(mixture) if mixture.is_estimate() => {
                "estimate: Peng-Robinson equation with constants that no measurement confirms"
            }
            Self::Mixture(_) => "Peng-Robinson equation, within about 1 K of reference mixture models (CoolProp 8.0.0)",
        }
    }

    fn density(&self, p: Pressure, t: ThermodynamicTemperature) -> Result<MassDensity, GasFault> {
        match self {
            Self::Pure(gas) => gas.density(p, t),
            Self::Mixture(mixture) => mixture.density(p, t),
        }
    }

    fn highest_filling(&self, t: ThermodynamicTemperature) -> Result<Pressure, GasFault> {
        match self {
            Self::Pure(gas) => gas.highest_filling(t),
            Self::Mixture(mixture) => mixture.highest_filling(t),
        }
    }

    fn mass_shares(&self) -> Vec<(&'static str, f64)> {
        match self {
            Self::Pure(gas) => vec![(gas.formula, 1.0)],
            Self::Mixture(mixture) => mixture.mass_shares(),
        }
    }

    fn dew_point(&self, density: &Figure<MassDensity>, p: Pressure, t: ThermodynamicTemperature) -> Option<DewPoint> {
        match self {
            Self::Pure(gas) => {
                let dew = gas.dew_point(density.value).ok()?;
                let figure = Figure::new(dew.temperature, "p(rho, T) = p_sat(T), solved for T", self.basis())
                    .from("rho", density)
                    .shown(celsius(dew.temperature));
                Some(DewPoint { figure, phase: dew.phase, certainty: Certainty::Measured })
            }
            Self::Mixture(mixture) => {
                let volume = mixture.molar_volume(p, t).ok()?;
                let dew = mixture.dew_point(volume)?;
                let certainty = if mixture.is_estimate() {
                    let far = mixture.without_interaction();
                    let warm = far.molar_volume(p, t).ok().and_then(|v| far.dew_point(v)).unwrap_or(dew);
                    let cold = mixture.partial_pressure_rule(p).unwrap_or(dew);
                    Certainty::Estimate { cold, warm }
                } else {
                    Certainty::Modelled
                };
                let figure = Figure::new(dew, "a liquid is more stable than the gas at constant volume", self.basis())
                    .given("p", absolute(p))
                    .shown(told(dew, certainty));
                let frost = mixture.triple_of_heaviest().is_some_and(|triple| dew < triple);
                Some(DewPoint { figure, phase: if frost { Phase::Frost } else { Phase::Liquid }, certainty })
            }
        }
    }

    fn pressure(&self, state: &LevelState, t: ThermodynamicTemperature) -> Option<Pressure> {
        let density = state.density.as_ref().ok()?.value;
        match self {
            Self::Pure(gas) => gas.pressure(density, t).ok(),
            Self::Mixture(mixture) => {
                let reference = REFERENCE_TEMPERATURE.value();
                let two_phase = mixture.molar_volume(state.pressure, reference).ok().and_then(|v| mixture.flash(v, t));
                two_phase.map(|state| state.pressure).or_else(|| mixture.pressure(density, t).ok())
            }
        }
    }
}

/// A dew point as sure as it is: a tenth of a degree, a degree, or a band.
pub fn told(dew: ThermodynamicTemperature, certainty: Certainty) -> String {
    let whole = |t: ThermodynamicTemperature| rounded(t.si() - ZERO_CELSIUS, 0);
    match certainty {
        Certainty::Measured => celsius(dew),
        Certainty::Modelled => format!("{} degC", whole(dew)),
        Certainty::Estimate { cold, warm } => format!("{} to {} degC (estimate)", whole(cold), whole(warm)),
    }
}

const ZERO_CELSIUS: f64 = 273.15;

/// A temperature of the gas as it is shown: to a tenth of a degree.
pub fn celsius(temperature: ThermodynamicTemperature) -> String {
    format!("{} degC", rounded(temperature.si() - ZERO_CELSIUS, 1))
}

/// A pressure of the gas as it is shown.
pub fn absolute(pressure: Pressure) -> String {
    format!("{} MPa abs", significant(pressure.si() / 1e6, 3))
}

/// The one gas that fills the breaker, where its constants are known, and how it was written.
fn medium(case: &Case<'_>, gas: &Particular) -> Option<(Medium, String)> {
    let (gases, _) = case.breaker.gases(gas)?;
    let [one] = gases else { return None };
    Medium::of(one).map(|medium| (medium, one.to_string()))
}

fn lowest_of_gas(case: &Case<'_>, heated: bool) -> Option<Figure<ThermodynamicTemperature>> {
    let ambient = lowest_ambient(case)?;
    let heated = heated && case.breaker.yes_no(&breaker::TANK_HEATERS).is_some_and(|(yes, _)| yes);
    let rise = case.breaker.quantity::<TemperatureInterval>(&breaker::HEATER_TEMPERATURE_RISE).filter(|_| heated);
    Some(match rise {
        None => Figure::stated("lowest ambient", &ambient).shown(celsius(ambient.value)),
        Some(rise) => {
            let warm = ThermodynamicTemperature::from_si(ambient.value.si() + rise.value.si());
            Figure::new(warm, "lowest ambient + heater temperature rise", "practice")
                .with("lowest ambient", &ambient)
                .with("rise", &rise)
                .shown(celsius(warm))
        }
    })
}

fn level_state(case: &Case<'_>, medium: &Medium, level: Level, particular: &Particular) -> Option<LevelState> {
    let (reading, statement): (_, &Statement) = case.breaker.quantity_reading(particular)?;
    let pressure = reading.absolute()?.pressure;
    let reference = reading.at.and_then(|at| at.to::<ThermodynamicTemperature>());
    let at = reference.unwrap_or_else(|| REFERENCE_TEMPERATURE.value());
    let density = medium.density(pressure, at).map(|density| {
        Figure::new(density, "p = rho R T (1 + B rho + C rho^2), solved for rho", medium.basis())
            .given("p", format!("{} MPa abs", significant(pressure.si() / 1e6, 4)))
            .given("T", celsius(at))
    });
    let dew_point = density.as_ref().ok().and_then(|figure| medium.dew_point(figure, pressure, at));
    Some(LevelState { level, place: statement.value, written: reading.shown(), pressure, density, dew_point })
}
