//! What the site makes of a rating: its heat and thin air of the current, its altitude of the insulation, its pollution of the length.

use super::{Duty, Figure, NamedFigure, named};
use crate::case::Case;
use crate::particular::{Limit, Particular, breaker, site, system};
use crate::physics::insulation_site::{allowed_current, altitude_factor, creepage, worth_on_site};
use crate::quantity::{
    ElectricCurrent, ElectricPotential, Length, Physical, Ratio, TemperatureInterval, ThermodynamicTemperature, Time,
    significant,
};
use crate::sheet::Stated;
use crate::standards::{
    TemperatureLimit, WithstandVoltage, altitude_cooling, altitude_exponent, pollution_class, temperature_limits,
};

/// What the site makes of the ratings.
#[derive(Clone, Debug, Default)]
pub struct SiteDuty {
    /// The continuous current that the heat of the site leaves; none up to 40 degC.
    pub current_in_heat: Option<Figure<ElectricCurrent>>,
    /// The continuous current that its thin air leaves; none up to 2000 m, and above the table.
    pub current_in_thin_air: Option<Figure<ElectricCurrent>>,
    /// The continuous current that both leave.
    pub continuous_current: Option<Figure<ElectricCurrent>>,
    /// What the rated power-frequency level is worth on site, rms.
    pub power_frequency_level: Option<LevelOnSite>,
    /// What the rated lightning impulse level is worth on site, peak.
    pub lightning_level: Option<LevelOnSite>,
    /// What the rated switching impulse level to earth is worth on site, peak.
    pub switching_level: Option<LevelOnSite>,
    /// The creepage distance that the pollution asks for.
    pub creepage: Option<Figure<Length>>,
    /// Relay, break time and margin.
    pub clearing_time: Option<Figure<Time>>,
}

/// What a level is worth on site.
#[derive(Clone, Debug)]
pub struct LevelOnSite {
    /// The altitude factor Ka; 1 for what does not stand in the air, and for levels stated for the site.
    pub factor: f64,
    /// The level there.
    pub worth: Figure<ElectricPotential>,
}

impl SiteDuty {
    pub(super) fn figures(&self) -> Vec<NamedFigure> {
        let worth = |level: &Option<LevelOnSite>| level.as_ref().map(|level| level.worth.clone());
        vec![
            named("continuous_current_at_site", "A", self.continuous_current.as_ref()),
            named("power_frequency_level_on_site", "V", worth(&self.power_frequency_level).as_ref()),
            named("lightning_level_on_site", "V", worth(&self.lightning_level).as_ref()),
            named("switching_level_on_site", "V", worth(&self.switching_level).as_ref()),
            named("creepage_needed", "m", self.creepage.as_ref()),
            named("clearing_time", "s", self.clearing_time.as_ref()),
        ]
    }
}

pub(super) fn fill(case: &Case<'_>, duty: &mut Duty) {
    let mut found = SiteDuty {
        power_frequency_level: level(
            case,
            &breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE,
            WithstandVoltage::PowerFrequency,
        ),
        lightning_level: level(
            case,
            &breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE,
            WithstandVoltage::LightningImpulse,
        ),
        switching_level: level(
            case,
            &breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE,
            WithstandVoltage::SwitchingToEarth,
        ),
        creepage: creepage_needed(case),
        clearing_time: clearing_time(case),
        ..SiteDuty::default()
    };
    currents(case, &mut found);
    duty.site = found;
}

/// Whether insulation stands in the air of the site: by the line of its own, else by the construction.
pub(crate) fn stands_in_air(case: &Case<'_>) -> bool {
    match case.breaker.word(&breaker::EXTERNAL_INSULATION) {
        Some(("none", _)) => return false,
        Some(_) => return true,
        None => {}
    }
    let enclosed = ["gas-insulated", "metal-clad", "metal-enclosed", "withdrawable"];
    let shut_in = is_indoor(case) && enclosed.iter().any(|word| case.is_built(word));
    !shut_in && !case.is_built("gas-insulated")
}

fn is_indoor(case: &Case<'_>) -> bool {
    case.site.word(&site::INSTALLATION).is_some_and(|(word, _)| word == "indoor")
}

/// Whether the levels are stated for the altitude of the site.
pub(crate) fn stated_for_site(case: &Case<'_>) -> bool {
    case.breaker.word(&breaker::INSULATION_STATED_FOR).is_some_and(|(word, _)| word == "site altitude")
}

/// What a rated level is worth at the altitude of the site.
fn level(case: &Case<'_>, rated: &Particular, kind: WithstandVoltage) -> Option<LevelOnSite> {
    let height = case.site.quantity::<Length>(&site::ALTITUDE)?;
    let stated = case.breaker.quantity::<ElectricPotential>(rated)?;
    let exponent = altitude_exponent(kind)?;
    if stated_for_site(case) || !stands_in_air(case) {
        let why = if stated_for_site(case) { "stated for the site" } else { "not in the air of the site" };
        let worth = Figure::new(stated.value, why, "IEC 62271-1, from memory").with("rated", &stated);
        return Some(LevelOnSite { factor: 1.0, worth });
    }
    let factor = altitude_factor(height.value, exponent);
    let worth = worth_on_site(stated.value, factor);
    let formula = "rated/Ka, Ka = exp(m (H - 1000 m)/8150 m)";
    let figure = Figure::new(worth, formula, "IEC 62271-1:2011 2.3.2, as a public article quotes it")
        .with("rated", &stated)
        .with("H", &height)
        .given("m", significant(exponent, 2))
        .given("Ka", significant(factor, 4))
        .shown(stated.like(worth));
    Some(LevelOnSite { factor, worth: figure })
}

/// The creepage that the class of the site asks for, outdoors.
fn creepage_needed(case: &Case<'_>) -> Option<Figure<Length>> {
    let (class, said) = case.site.word(&site::POLLUTION).filter(|_| !is_indoor(case))?;
    let rated = case.rated_voltage()?;
    let row = pollution_class(class)?;
    let diameter = case.breaker.quantity::<Ratio>(&breaker::DIAMETER_CORRECTION_FACTOR);
    let factor = diameter.as_ref().map_or(1.0, |factor| factor.value.value);
    let needed = creepage(row.unified(), rated.value) * factor;
    let formula = if diameter.is_some() { "USCD Ur/sqrt3 Kad" } else { "USCD Ur/sqrt3" };
    let mut figure = Figure::new(needed, formula, "IEC 60815-1:2008, as a public script cites it")
        .given("USCD", format!("{} mm/kV (class {class})", significant(row.unified().si() * 1e6, 3)));
    if let Some(input) = figure.working.inputs.last_mut() {
        input.place = Some(said.value);
    }
    let figure = figure.with("Ur", &rated).shown(format!("{} mm", significant(needed.si() * 1e3, 4)));
    Some(match diameter {
        Some(diameter) => figure.with("Kad", &diameter),
        None => figure,
    })
}

/// The ambient temperature up to which a rated current holds, K (IEC 62271-1, from memory).
const RATED_AMBIENT: f64 = 313.15;

/// The limit of silver-plated contacts in air, K, which governs where none is stated (from memory).
const USUAL_LIMIT: f64 = 378.15;

/// Altitude up to which cooling needs no correction, m (IEC 62271-1, from memory).
const COOLING_ALTITUDE_TO: f64 = 2000.0;

/// Slack in comparing two values of the text.
const EQUAL: f64 = 1e-4;

/// The highest air temperature of the site.
fn hottest<'a>(case: &'a Case<'_>) -> Option<Stated<'a, ThermodynamicTemperature>> {
    let own = case.site.quantity::<ThermodynamicTemperature>(&site::HIGHEST_AMBIENT);
    own.or_else(|| case.site.side(&site::AMBIENT, Limit::Greatest))
}

fn currents(case: &Case<'_>, found: &mut SiteDuty) {
    let Some(rated) = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT) else { return };
    let hottest = hottest(case);
    let altitude = case.site.quantity::<Length>(&site::ALTITUDE);
    let hot = hottest.filter(|t| t.value.si() > RATED_AMBIENT + EQUAL);
    let high = altitude.filter(|height| height.value.si() > COOLING_ALTITUDE_TO * (1.0 + EQUAL));
    found.current_in_heat = hot.and_then(|hottest| in_heat(case, &rated, &hottest));
    found.current_in_thin_air = high.and_then(|height| {
        let factor = altitude_cooling(height.value)?;
        let left = rated.value * factor;
        Some(
            Figure::new(left, "Ir x factor(H)", "IEEE C37.20.2, C37.100, from memory")
                .with("Ir", &rated)
                .with("H", &height)
                .given("factor", significant(factor, 3))
                .shown(rated.like(left)),
        )
    });
    let (heat, air) = (found.current_in_heat.as_ref(), found.current_in_thin_air.as_ref());
    // Above the table nothing is known, and without a temperature and an altitude neither.
    if hottest.is_none() || altitude.is_none() || (high.is_some() && air.is_none()) || (hot.is_some() && heat.is_none())
    {
        return;
    }
    found.continuous_current = match (heat, air) {
        (Some(heat), Some(air)) => {
            let both = heat.value * (air.value / rated.value).value;
            let figure = Figure::new(both, "heat x thin air/Ir", "the two in a row").from("heat", heat);
            Some(figure.from("thin air", air).with("Ir", &rated).shown(rated.like(both)))
        }
        (Some(one), None) | (None, Some(one)) => Some(one.clone()),
        (None, None) => Some(
            Figure::new(rated.value, "Ir, up to 40 degC and 2000 m", "IEC 62271-1, from memory")
                .with("Ir", &rated)
                .shown(rated.measure.to_string()),
        ),
    };
}

fn in_heat(
    case: &Case<'_>,
    rated: &Stated<'_, ElectricCurrent>,
    hottest: &Stated<'_, ThermodynamicTemperature>,
) -> Option<Figure<ElectricCurrent>> {
    let stated = case.breaker.quantity::<ThermodynamicTemperature>(&breaker::LIMITING_TEMPERATURE);
    let usual = temperature_limits().iter().map(TemperatureLimit::greatest).min_by(|a, b| {
        let far = |t: &ThermodynamicTemperature| (t.si() - USUAL_LIMIT).abs();
        far(a).total_cmp(&far(b))
    });
    let greatest = stated.as_ref().map(|limit| limit.value).or(usual)?;
    let rise = TemperatureInterval::from_si(greatest.si() - RATED_AMBIENT);
    if rise.si() <= 0.0 {
        return None;
    }
    let allowed = allowed_current(rated.value, hottest.value, greatest, rise);
    let formula = "Ir ((Tmax - Ta)/(Tmax - 40 degC))^(1/1.8)";
    let figure =
        Figure::new(allowed, formula, "IEEE C37.010-1999 4.4.3, from memory").with("Ir", rated).with("Ta", hottest);
    let figure = match stated {
        Some(limit) => figure.with("Tmax", &limit),
        None => figure.given("Tmax", format!("{} degC (silver in air)", significant(greatest.si() - 273.15, 4))),
    };
    Some(figure.shown(rated.like(allowed)))
}

/// Relay and breaker: until the fault is cleared, with the margin of the policy.
fn clearing_time(case: &Case<'_>) -> Option<Figure<Time>> {
    let relay = case.system.greatest::<Time>(&system::RELAY_TIME)?;
    let total = case.breaker.greatest::<Time>(&breaker::BREAK_TIME)?;
    let margin = Time::from_si(case.policy.clearing_margin);
    Some(
        Figure::new(relay.value + total.value + margin, "relay + break + margin", "common practice, no source")
            .with("relay", &relay)
            .with("break", &total)
            .given("margin", margin.show()),
    )
}
