//! The gas in the cold: density and dew point of each level, and what is left at the lowest ambient temperature.

use super::{Figure, NamedFigure, lowest_ambient, named, named_temperature, percent};
use crate::case::Case;
use crate::particular::{Particular, breaker};
use crate::physics::gas::{Condensation, GasFault, PureGas, sf6};
use crate::quantity::{MassDensity, Physical, Pressure, Ratio, ThermodynamicTemperature, rounded, significant};
use crate::sheet::Statement;
use crate::source::Place;
use crate::standards::REFERENCE_TEMPERATURE;

const BASIS: &str =
    "equation of state of SF6 (fit to CoolProp 8.0.0), vapour pressure by Guder and Wagner 2009 (from memory)";

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
    /// The dew point, where the density is known.
    pub dew_point: Option<(Figure<ThermodynamicTemperature>, Condensation)>,
}

/// The gas of a case, where it is one pure gas whose constants are known.
#[derive(Clone, Debug, Default)]
pub struct GasDuty {
    /// The levels that are stated.
    pub levels: Vec<LevelState>,
    /// The lowest temperature of the gas: of the air, raised by heaters that declare by how much.
    pub lowest: Option<Figure<ThermodynamicTemperature>>,
    /// The highest filling that does not condense there, Pa abs at 20 degC.
    pub highest_filling: Option<Figure<Pressure>>,
    /// The condensed share of the filling there.
    pub condensed: Option<Figure<Ratio>>,
    /// The pressure at 20 degC that the remaining vapour stands for.
    pub remaining: Option<Figure<Pressure>>,
}

impl GasDuty {
    /// The gas of a case.
    pub(super) fn of(case: &Case<'_>) -> Self {
        let Some(gas) = pure_gas(case) else { return Self::default() };
        let mut duty = Self { lowest: lowest_of_gas(case), ..Self::default() };
        let minimum = if case.breaker.mentions(&breaker::MINIMUM_FUNCTIONAL_PRESSURE) {
            &breaker::MINIMUM_FUNCTIONAL_PRESSURE
        } else {
            &breaker::LOCKOUT_PRESSURE
        };
        for (level, particular) in [
            (Level::Filling, &breaker::RATED_FILLING_PRESSURE),
            (Level::Alarm, &breaker::ALARM_PRESSURE),
            (Level::Minimum, minimum),
        ] {
            duty.levels.extend(level_state(case, gas, level, particular));
        }
        if let Some(lowest) = &duty.lowest {
            duty.highest_filling = gas.highest_filling(lowest.value).ok().map(|pressure| {
                Figure::new(pressure, "pressure at 20 degC of the vapour saturated at the lowest temperature", BASIS)
                    .given("lowest temperature", celsius(lowest.value))
                    .shown(format!("{} MPa abs", significant(pressure.si() / 1e6, 3)))
            });
            let filling = duty.levels.iter().find(|state| state.level == Level::Filling);
            if let Some(density) = filling.and_then(|state| state.density.as_ref().ok())
                && let Ok(state) = gas.two_phase(density.value, lowest.value)
            {
                duty.condensed = Some(
                    Figure::new(state.condensed, "(1 - rho_g/rho)/(1 - rho_g/rho_l)", BASIS)
                        .from("rho", density)
                        .given("rho_g", state.vapour.show())
                        .given("temperature", celsius(lowest.value))
                        .shown(percent(state.condensed.value)),
                );
                let left = gas.reference_pressure(state.vapour);
                duty.remaining = Some(
                    Figure::new(left, "pressure at 20 degC of the remaining vapour", BASIS)
                        .given("rho_g", state.vapour.show())
                        .shown(format!("{} MPa abs", significant(left.si() / 1e6, 3))),
                );
            }
        }
        duty
    }

    /// A level that is stated.
    pub fn level(&self, level: Level) -> Option<&LevelState> {
        self.levels.iter().find(|state| state.level == level)
    }

    pub(super) fn figures(&self) -> Vec<NamedFigure> {
        let density = self.level(Level::Filling).and_then(|state| state.density.as_ref().ok());
        let dew = |level| self.level(level).and_then(|state| state.dew_point.as_ref()).map(|(figure, _)| figure);
        vec![
            named("gas_density", "kg/m3", density),
            named_temperature("gas_dew_point_filling", dew(Level::Filling)),
            named_temperature("gas_dew_point_alarm", dew(Level::Alarm)),
            named_temperature("gas_dew_point_minimum", dew(Level::Minimum)),
            named("gas_highest_filling", "Pa", self.highest_filling.as_ref()),
            named("gas_liquid_share", "1", self.condensed.as_ref()),
            named("gas_remaining_pressure", "Pa", self.remaining.as_ref()),
        ]
    }
}

/// A temperature of the gas as it is shown: to a tenth of a degree.
pub fn celsius(temperature: ThermodynamicTemperature) -> String {
    format!("{} degC", rounded(temperature.si() - 273.15, 1))
}

/// The one pure gas that fills the breaker, where its constants are known.
fn pure_gas(case: &Case<'_>) -> Option<&'static PureGas> {
    let (gases, _) = case.breaker.gases(&breaker::INSULATING_GAS)?;
    match gases {
        [one] if one.pure() == Some("SF6") => Some(sf6()),
        _ => None,
    }
}

fn lowest_of_gas(case: &Case<'_>) -> Option<Figure<ThermodynamicTemperature>> {
    let ambient = lowest_ambient(case)?;
    let heated = case.breaker.yes_no(&breaker::TANK_HEATERS).is_some_and(|(yes, _)| yes);
    let rise = case
        .breaker
        .quantity::<crate::quantity::TemperatureInterval>(&breaker::HEATER_TEMPERATURE_RISE)
        .filter(|_| heated);
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

fn level_state(case: &Case<'_>, gas: &PureGas, level: Level, particular: &Particular) -> Option<LevelState> {
    let (reading, statement): (_, &Statement) = case.breaker.quantity_reading(particular)?;
    let pressure = reading.absolute()?.pressure;
    let reference = reading.at.and_then(|at| at.to::<ThermodynamicTemperature>());
    let at = reference.unwrap_or_else(|| ThermodynamicTemperature::from_si(REFERENCE_TEMPERATURE));
    let density = gas.density(pressure, at).map(|density| {
        Figure::new(density, "p = rho R T (1 + B rho + C rho^2), solved for rho", BASIS)
            .given("p", format!("{} MPa abs", significant(pressure.si() / 1e6, 4)))
            .given("T", celsius(at))
    });
    let dew_point = density.as_ref().ok().and_then(|figure| {
        let dew = gas.dew_point(figure.value).ok()?;
        let named = Figure::new(dew.temperature, "p(rho, T) = p_sat(T), solved for T", BASIS)
            .from("rho", figure)
            .shown(celsius(dew.temperature));
        Some((named, dew))
    });
    Some(LevelState { level, place: statement.value, written: reading.shown(), pressure, density, dew_point })
}
