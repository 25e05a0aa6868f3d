//! Insulation levels by the row of the table and the air of the site, and creepage by its pollution.

use super::{Choice, NotChosen, Outcome, chosen, known, measure, needs, no_value, regimes};
use crate::case::Case;
use crate::duty::stands_in_air;
use crate::particular::{Particular, breaker, site, system};
use crate::physics::insulation_site::{altitude_factor, creepage, needed_level};
use crate::quantity::{Dimension, ElectricPotential, Length, Physical, Ratio, significant};
use crate::standards::{
    InsulationLevel, PollutionClass, WithstandVoltage, altitude_exponent, insulation_levels, pollution_class,
};

pub(super) static CHOICES: &[Choice] = &[
    Choice::base(&breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE, |case| level(case, &LEVELS[0])),
    Choice::base(&breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE, |case| level(case, &LEVELS[1])),
    Choice::base(&breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE, |case| level(case, &LEVELS[2])),
    Choice::leaf(&breaker::CREEPAGE_DISTANCE, creepage_distance),
    Choice::leaf(&breaker::UNIFIED_SPECIFIC_CREEPAGE_DISTANCE, unified),
];

/// A kind of level: its rating, what is needed of it on site, and where it stands in a row.
struct Kind {
    rated: &'static Particular,
    needed: &'static Particular,
    of_system: &'static Particular,
    voltage: WithstandVoltage,
    of_row: fn(&InsulationLevel) -> Option<ElectricPotential>,
}

static LEVELS: [Kind; 3] = [
    Kind {
        rated: &breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE,
        needed: &breaker::LIGHTNING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        of_system: &system::LIGHTNING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        voltage: WithstandVoltage::LightningImpulse,
        of_row: |row| Some(row.lightning()),
    },
    Kind {
        rated: &breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE,
        needed: &breaker::POWER_FREQUENCY_LEVEL_NEEDED_ON_SITE,
        of_system: &system::POWER_FREQUENCY_LEVEL_NEEDED_ON_SITE,
        voltage: WithstandVoltage::PowerFrequency,
        of_row: |row| Some(row.power_frequency()),
    },
    Kind {
        rated: &breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE,
        needed: &breaker::SWITCHING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        of_system: &system::SWITCHING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        voltage: WithstandVoltage::SwitchingToEarth,
        of_row: InsulationLevel::switching,
    },
];

/// Relative slack below which two levels are one.
const SAME: f64 = 1e-4;

/// Factor of the altitude on levels of this kind, with how it came about; 1 where the insulation does not feel it.
fn air(case: &Case<'_>, kind: &Kind) -> Result<(f64, String), NotChosen> {
    let for_site = case.breaker.word(&breaker::INSULATION_STATED_FOR).is_some_and(|(word, _)| word == "site altitude");
    if for_site || !stands_in_air(case) {
        return Ok((1.0, String::new()));
    }
    let height = known(case.site.quantity::<Length>(&site::ALTITUDE), "the altitude of the site")?;
    let exponent = known(altitude_exponent(kind.voltage), "an altitude exponent")?;
    let factor = altitude_factor(height.value, exponent);
    if factor <= 1.0 + SAME {
        return Ok((1.0, String::new()));
    }
    let working = format!(
        " x Ka, Ka = exp({} x ({} - 1000 m)/8150 m) = {}",
        significant(exponent, 2),
        height.measure,
        significant(factor, 4)
    );
    Ok((factor, working))
}

/// What a kind of level has to hold in the standard atmosphere: the level needed on site, or the margin over the arresters.
fn demand(case: &Case<'_>, kind: &Kind) -> Result<Option<(ElectricPotential, String)>, NotChosen> {
    let (factor, by_air) = air(case, kind)?;
    let site = case
        .breaker
        .quantity::<ElectricPotential>(kind.needed)
        .or_else(|| case.system.quantity::<ElectricPotential>(kind.of_system));
    if let Some(site) = site {
        let wanted = needed_level(site.value, factor);
        let text = format!("{} needed on site{by_air}: {}", site.measure, site.like(wanted));
        return Ok(Some((wanted, text)));
    }
    let lightning = kind.voltage == WithstandVoltage::LightningImpulse;
    let arrester =
        case.system.quantity::<ElectricPotential>(&system::ARRESTER_LIGHTNING_PROTECTIVE_LEVEL).filter(|_| lightning);
    if let Some(arrester) = arrester {
        let margin = case.policy.lightning_margin;
        let wanted = needed_level(arrester.value * margin, factor);
        let text = format!(
            "{} x the protective level {} of the arresters{by_air}: {}",
            significant(margin, 3),
            arrester.measure,
            arrester.like(wanted)
        );
        return Ok(Some((wanted, text)));
    }
    if factor > 1.0 {
        return needs(format!(
            "the {}: the site is high, and a row of the table is for up to 1000 m",
            kind.needed.label
        ));
    }
    Ok(None)
}

/// Whether a row is for where the breaker stands; most tables do not tell.
fn is_for_place(case: &Case<'_>, row: &InsulationLevel) -> bool {
    let place = case.site.word(&site::INSTALLATION).map(|(word, _)| word);
    row.location.is_empty() || place.is_none_or(|place| place == row.location)
}

fn level(case: &Case<'_>, kind: &Kind) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let families = regimes(case);
    let own: Vec<&InsulationLevel> = insulation_levels()
        .iter()
        .filter(|row| row.is_for(rated.value) && families.contains(&row.regime) && is_for_place(case, row))
        .collect();
    if own.is_empty() {
        return no_value(format!("the tables have no row for {}", rated.measure));
    }
    if own.iter().all(|row| (kind.of_row)(row).is_none()) {
        return no_value(format!("the tables have no such level at {}: leave the line out", rated.measure));
    }
    let demanded = demand(case, kind)?;
    if air(case, kind)?.0 > 1.0 {
        return beyond_the_row(case, kind, demanded);
    }
    // What is asked of the other levels narrows the rows as well; what is missing of them is no matter here.
    let demands: Vec<Option<(ElectricPotential, String)>> =
        LEVELS.iter().map(|other| demand(case, other).unwrap_or_default()).collect();
    // A row is one test: what is stated of it, or chosen already, holds, and all demands do.
    let mut stated = String::new();
    let mut rows = own;
    for other in LEVELS.iter().filter(|other| !other.rated.is(kind.rated)) {
        let Some(level) = case.breaker.quantity::<ElectricPotential>(other.rated) else { continue };
        let is = |row: &&InsulationLevel| {
            (other.of_row)(row).is_some_and(|v| (v.si() - level.value.si()).abs() <= SAME * v.si())
        };
        rows.retain(is);
        if rows.is_empty() {
            return no_value(format!("{} is in no row of the table for {}", level.measure, rated.measure));
        }
        stated += &format!(" with {}", level.measure);
    }
    let whole = rows.len();
    for (demand, other) in demands.iter().zip(&LEVELS) {
        let Some((wanted, _)) = demand else { continue };
        rows.retain(|row| (other.of_row)(row).is_none_or(|v| v.si() >= wanted.si() * (1.0 - SAME)));
    }
    let told: Vec<&str> = demands.iter().flatten().map(|(_, text)| text.as_str()).collect();
    let mut levels: Vec<f64> = rows.iter().filter_map(|row| (kind.of_row)(row)).map(Physical::si).collect();
    levels.sort_by(f64::total_cmp);
    levels.dedup_by(|a, b| (*a - *b).abs() <= SAME * a.abs());
    let Some(least) = levels.first() else {
        return no_value(format!("no row for {} holds {}", rated.measure, told.join(" and ")));
    };
    if levels.len() > 1 && told.is_empty() {
        let shown: Vec<String> = levels.iter().map(|v| significant(v / 1e3, 4)).collect();
        let arrester = if kind.voltage == WithstandVoltage::LightningImpulse {
            ", or the arrester lightning protective level of the system"
        } else {
            ", or the rated lightning impulse withstand voltage"
        };
        return needs(format!(
            "the {}{arrester}; the table has {} kV for {}",
            kind.needed.label,
            shown.join(" and "),
            rated.measure
        ));
    }
    let value = measure(*least, Dimension::Voltage, "kV");
    let by = if told.is_empty() { String::new() } else { format!(", not below {}", told.join(" and ")) };
    let which = if whole == 1 { "the row" } else { "lowest row" };
    chosen(value, format!("{which} of the table for {}{stated}{by}: {value}", rated.measure))
}

/// On a high site a level need not be of a row for the rated voltage: the next one of any row.
fn beyond_the_row(case: &Case<'_>, kind: &Kind, demanded: Option<(ElectricPotential, String)>) -> Outcome {
    let (wanted, text) = known(demanded, kind.needed.label)?;
    let families = regimes(case);
    let next = insulation_levels()
        .iter()
        .filter(|row| families.contains(&row.regime))
        .filter_map(kind.of_row)
        .filter(|level| level.si() >= wanted.si() * (1.0 - SAME))
        .min_by(|a, b| a.si().total_cmp(&b.si()));
    let Some(next) = next else { return no_value(format!("no level of the tables reaches {text}")) };
    let value = measure(next.si(), Dimension::Voltage, "kV");
    chosen(value, format!("next level of the tables not below {text}: {value}"))
}

fn pollution(case: &Case<'_>) -> Result<&'static PollutionClass, NotChosen> {
    if case.site.word(&site::INSTALLATION).is_some_and(|(word, _)| word == "indoor") {
        return no_value("indoors no class of pollution asks for a creepage: state the value");
    }
    let (class, _) = known(case.site.word(&site::POLLUTION), "the pollution of the site")?;
    known(pollution_class(class), "the pollution of the site")
}

fn unified(case: &Case<'_>) -> Outcome {
    let class = pollution(case)?;
    let value = measure(class.unified().si(), Dimension::LengthPerVoltage, "mm/kV");
    chosen(value, format!("reference of pollution class {}: {value}", class.class))
}

fn creepage_distance(case: &Case<'_>) -> Outcome {
    let class = pollution(case)?;
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let diameter = case.breaker.quantity::<Ratio>(&breaker::DIAMETER_CORRECTION_FACTOR);
    let factor = diameter.map_or(1.0, |k| k.value.value);
    let needed = creepage(class.unified(), rated.value) * factor;
    // Up to whole ten millimetres, as lengths are asked for; a length that is whole already stays.
    let rounded = (needed.si() * 100.0 - 1e-9).ceil() / 100.0;
    let value = measure(rounded, Dimension::Length, "mm");
    let by_diameter = diameter.map(|k| format!(" Kad, Kad = {}", significant(k.value.value, 3))).unwrap_or_default();
    let working = format!(
        "USCD Ur/sqrt3{by_diameter}: {} mm/kV x {}/1.732 = {} mm, up to whole ten millimetres: {value}",
        significant(class.unified().si() * 1e6, 3),
        rated.measure,
        significant(needed.si() * 1e3, 4)
    );
    chosen(value, working)
}

#[cfg(test)]
mod tests {
    use super::super::testing::{chooses, open};
    use crate::rules::testing::Bay;

    const UP: &str = "rated lightning impulse withstand voltage";
    const UD: &str = "rated short-duration power-frequency withstand voltage";
    const US: &str = "rated switching impulse withstand voltage";

    fn at(kv: &str) -> Bay {
        Bay::new().set("breaker", "rated voltage", kv).without("breaker", UP).without("breaker", UD)
    }

    fn needed(level: &str) -> Bay {
        at("145 kV").set("breaker", "lightning impulse level needed on site", level)
    }

    /// 72.5 kV has one row of IEC, 140/325 kV; 145 kV has 230/550 and 275/650 kV.
    #[test]
    fn a_row_of_the_table() {
        chooses(at("72.5 kV"), UP, "325 kV");
        chooses(at("72.5 kV"), UD, "140 kV");
        open(at("145 kV"), UP, "550 and 650 kV");
        chooses(at("145 kV").set("breaker", UP, "650 kV"), UD, "275 kV");
        chooses(at("145 kV").set("breaker", UD, "230 kV"), UP, "550 kV");
        open(at("145 kV").set("breaker", UP, "600 kV"), UD, "no row");
        open(at("146 kV"), UP, "no row");
        open(at("145 kV"), US, "leave the line out");
        open(at("145 kV").without("breaker", "rated voltage"), UP, "rated voltage");
    }

    #[test]
    fn the_level_that_is_needed_on_site() {
        chooses(needed("549 kV"), UP, "550 kV");
        chooses(needed("550 kV"), UP, "550 kV");
        chooses(needed("551 kV"), UP, "650 kV");
        open(needed("651 kV"), UP, "no row");
        // The power-frequency level is that of the row which the lightning level asks for.
        chooses(needed("551 kV"), UD, "275 kV");
        chooses(needed("551 kV").set("breaker", UP, "from duty"), UD, "275 kV");
    }

    /// 1.2 times 458 kV is 549.6 kV, 1.2 times 459 kV 550.8 kV.
    #[test]
    fn the_margin_over_the_arresters() {
        let arrester = |kv: &str| at("145 kV").set("system", "arrester lightning protective level", kv);
        chooses(arrester("458 kV"), UP, "550 kV");
        chooses(arrester("459 kV"), UP, "650 kV");
    }

    /// Own calculation: Ka = 1.1306 at 2000 m for lightning; 575 kV becomes 650.1 kV, 574 kV 648.9 kV.
    #[test]
    fn thin_air() {
        let high = |level: &str| needed(level).set("site", "altitude", "2000 m");
        chooses(high("574 kV"), UP, "650 kV");
        chooses(high("576 kV"), UP, "750 kV");
        chooses(needed("576 kV").set("site", "altitude", "1000 m"), UP, "650 kV");
        open(at("145 kV").set("site", "altitude", "2000 m"), UP, "lightning impulse level needed on site");
        open(needed("576 kV").without("site", "altitude"), UP, "altitude");
        // Gas does not feel it.
        let inside = high("576 kV").set("breaker", "construction", "gas-insulated");
        chooses(inside.without("site", "altitude"), UP, "650 kV");
    }

    /// 420 kV has 950 and 1050 kV to earth.
    #[test]
    fn switching_impulse() {
        let bay = |level: &str| at("420 kV").set("breaker", "switching impulse level needed on site", level);
        chooses(bay("950 kV"), US, "950 kV");
        chooses(bay("951 kV"), US, "1050 kV");
        open(at("420 kV"), US, "950 and 1050 kV");
    }

    /// Own calculation: 34.7 mm/kV x 145/sqrt3 is 2904.9 mm; 22.0 at 145 kV 1841.7 mm.
    #[test]
    fn creepage_by_pollution() {
        let class = |text: &str| Bay::new().set("site", "pollution", text);
        chooses(class("c"), "creepage distance", "2910 mm");
        chooses(class("a"), "creepage distance", "1850 mm");
        chooses(class("c").set("breaker", "diameter correction factor", "1.1"), "creepage distance", "3200 mm");
        chooses(class("e"), "unified specific creepage distance", "53.7 mm/kV");
        open(Bay::new().without("site", "pollution"), "creepage distance", "pollution");
        open(Bay::new().set("site", "installation", "indoor"), "creepage distance", "indoors");
    }
}
