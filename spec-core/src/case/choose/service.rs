//! What the site asks for: temperatures, ice, wind, earthquakes, loads on the terminals, internal arcs.

use super::{Choice, Outcome, chosen, known, measure, no_value, word};
use crate::case::Case;
use crate::duty::lowest_ambient;
use crate::particular::{Limit, breaker, site, words};
use crate::quantity::{Acceleration, Dimension, ElectricCurrent, Length, Physical, ThermodynamicTemperature, Velocity};
use crate::rules::climate::class_temperature;
use crate::standards::{TerminalLoads, ice_classes, seismic_level_for, terminal_loads};

pub(super) static CHOICES: &[Choice] = &[
    Choice::leaf(&breaker::TEMPERATURE_CLASS, temperature_class),
    Choice::leaf(&breaker::LOWEST_SERVICE_TEMPERATURE, lowest),
    Choice::leaf(&breaker::LOW_TEMPERATURE_TEST, lowest),
    Choice::leaf(&breaker::HIGHEST_SERVICE_TEMPERATURE, highest),
    Choice::leaf(&breaker::ICE_CLASS, ice),
    Choice::leaf(&breaker::DESIGN_WIND_SPEED, wind),
    Choice::leaf(&breaker::SEISMIC_QUALIFICATION, seismic),
    Choice::leaf(&breaker::STATIC_TERMINAL_LOAD_LONGITUDINAL, |case| load(case, |loads| loads.longitudinal.si())),
    Choice::leaf(&breaker::STATIC_TERMINAL_LOAD_TRANSVERSE, |case| load(case, |loads| loads.transverse.si())),
    Choice::leaf(&breaker::STATIC_TERMINAL_LOAD_VERTICAL, |case| load(case, |loads| loads.vertical.si())),
    Choice::leaf(&breaker::INTERNAL_ARC_CURRENT, internal_arc),
];

const LOWEST: &str = "the lowest ambient temperature of the site";

/// Temperatures are compared to this, K: printed degrees.
const DEGREE_SLACK: f64 = 1e-6;

fn temperature_class(case: &Case<'_>) -> Outcome {
    let lowest = known(lowest_ambient(case), LOWEST)?;
    let (place, _) = known(case.site.word(&site::INSTALLATION), "whether the site is indoor or outdoor")?;
    let class = words::TEMPERATURE_CLASS.all().find(|class| {
        class.ends_with(place) && class_temperature(class).is_some_and(|t| t <= lowest.value.si() + DEGREE_SLACK)
    });
    match class {
        Some(class) => word(class, format!("warmest {place} class not above {}: {class}", lowest.measure)),
        None => no_value(format!("no {place} class covers {}", lowest.measure)),
    }
}

fn lowest(case: &Case<'_>) -> Outcome {
    let lowest = known(lowest_ambient(case), LOWEST)?;
    chosen(lowest.measure, format!("the lowest ambient temperature of the site: {}", lowest.measure))
}

fn highest(case: &Case<'_>) -> Outcome {
    let own = case.site.quantity::<ThermodynamicTemperature>(&site::HIGHEST_AMBIENT);
    let highest = own.or_else(|| case.site.side(&site::AMBIENT, Limit::Greatest));
    let highest = known(highest, "the highest ambient temperature of the site")?;
    chosen(highest.measure, format!("the highest ambient temperature of the site: {}", highest.measure))
}

fn ice(case: &Case<'_>) -> Outcome {
    let there = known(case.site.quantity::<Length>(&site::ICE), "the ice of the site")?;
    let class = ice_classes().find(|class| class.si() >= there.value.si() * (1.0 - 1e-4));
    let Some(class) = class else { return no_value(format!("no class reaches {} of ice", there.measure)) };
    let value = measure(class.si(), Dimension::Length, "mm");
    chosen(value, format!("least class not below {}: {value}", there.measure))
}

fn wind(case: &Case<'_>) -> Outcome {
    let there = known(case.site.quantity::<Velocity>(&site::WIND), "the wind of the site")?;
    chosen(there.measure, format!("the wind of the site: {}", there.measure))
}

fn seismic(case: &Case<'_>) -> Outcome {
    let ground =
        known(case.site.quantity::<Acceleration>(&site::SEISMIC_ACCELERATION), "the seismic acceleration of the site")?;
    match seismic_level_for(ground.value) {
        Some((level, design)) => word(
            level,
            format!("lowest level whose design acceleration {} is not below {}", ground.like(design), ground.measure),
        ),
        None => chosen(ground.measure, format!("no level reaches the acceleration of the site, {}", ground.measure)),
    }
}

fn load(case: &Case<'_>, direction: fn(&TerminalLoads) -> f64) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let current = known(
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT),
        "the rated continuous current",
    )?;
    let Some(loads) = terminal_loads(rated.value, current.value) else {
        return no_value(format!("the standard has no example for {} and {}", rated.measure, current.measure));
    };
    let value = measure(direction(&loads), Dimension::Force, "N");
    chosen(value, format!("example of the standard for {} and {}: {value}", rated.measure, current.measure))
}

fn internal_arc(case: &Case<'_>) -> Outcome {
    let current = known(
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT),
        "the rated short-time withstand current",
    )?;
    chosen(current.measure, format!("equal to the short-time withstand current: {}", current.measure))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{chooses, open};
    use crate::rules::testing::Bay;

    #[test]
    fn temperatures() {
        let cold = |text: &str| Bay::new().set("site", "lowest ambient", text);
        chooses(cold("-25 degC"), "temperature class", "minus 25 outdoor");
        chooses(cold("-24 degC"), "temperature class", "minus 25 outdoor");
        chooses(cold("-26 degC"), "temperature class", "minus 30 outdoor");
        chooses(cold("-4 degC").set("site", "installation", "indoor"), "temperature class", "minus 5 indoor");
        open(cold("-51 degC"), "temperature class", "no outdoor class");
        open(Bay::new().without("site", "lowest ambient"), "temperature class", "lowest ambient");
        open(Bay::new().without("site", "installation"), "temperature class", "indoor or outdoor");
        chooses(cold("-42 degC"), "lowest service temperature", "-42 degC");
        chooses(cold("-42 degC"), "low-temperature test", "-42 degC");
        chooses(Bay::new(), "highest service temperature", "40 degC");
        open(Bay::new().without("site", "highest ambient"), "highest service temperature", "highest ambient");
    }

    #[test]
    fn ice_and_wind() {
        let ice = |text: &str| Bay::new().set("site", "ice", text);
        chooses(ice("10 mm"), "ice class", "10 mm");
        chooses(ice("9 mm"), "ice class", "10 mm");
        chooses(ice("11 mm"), "ice class", "20 mm");
        open(ice("21 mm"), "ice class", "no class");
        open(Bay::new().without("site", "ice"), "ice class", "ice of the site");
        chooses(Bay::new(), "design wind speed", "34 m/s");
        open(Bay::new().without("site", "wind"), "design wind speed", "wind of the site");
    }

    #[test]
    fn earthquakes() {
        let ground = |text: &str| Bay::new().set("site", "seismic acceleration", text);
        chooses(ground("0.25 g"), "seismic qualification", "moderate");
        chooses(ground("0.24 g"), "seismic qualification", "moderate");
        chooses(ground("0.26 g"), "seismic qualification", "high");
        chooses(ground("0.6 g"), "seismic qualification", "0.6 g");
        open(Bay::new().without("site", "seismic acceleration"), "seismic qualification", "seismic acceleration");
    }

    /// 145 kV, from memory of IEC 62271-100:2008 6.101.6: 1250, 750 and 1000 N from 2500 A, 1000 N along up to 2000 A.
    #[test]
    fn loads_and_arcs() {
        chooses(Bay::new(), "static terminal load longitudinal", "1250 N");
        chooses(Bay::new(), "static terminal load transverse", "750 N");
        chooses(Bay::new(), "static terminal load vertical", "1000 N");
        let current = |a: &str| Bay::new().set("breaker", "rated continuous current", a);
        chooses(current("2000 A"), "static terminal load longitudinal", "1000 N");
        open(Bay::new().without("breaker", "rated voltage"), "static terminal load vertical", "rated voltage");
        chooses(Bay::new(), "internal arc current", "31.5 kA");
        open(
            Bay::new().without("breaker", "rated short-time withstand current"),
            "internal arc current",
            "short-time withstand current",
        );
    }
}
