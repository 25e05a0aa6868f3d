//! Rules on switching surges and on the distances in air that hold them.

use super::switching_special::{has_measure, kind_of, mitigation};
use super::{Check, EQUAL, Rule};
use crate::case::{Case, Part};
use crate::duty::{stands_in_air, stated_for_site};
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker, circuit, site, system};
use crate::physics::insulation_site::altitude_factor;
use crate::physics::trv::crest;
use crate::quantity::{ElectricPotential, Length, Physical, Ratio, significant};
use crate::sheet::Stated;
use crate::standards::{WithstandVoltage, altitude_exponent, clearance};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&SWITCHING_OVERVOLTAGE_STUDY, &VACUUM_SURGE_PROTECTION, &PHASE_SPACING];

/// Long lines have a limit of the switching overvoltage.
pub static SWITCHING_OVERVOLTAGE_STUDY: Rule = Rule {
    name: "switching-overvoltage-study",
    title: "For a long line of 300 kV and above, the switching overvoltage is limited, and the limit is below the switching level.",
    kind: FindingKind::Remark,
    basis: "IEC 60071-1, -2 (from memory); common practice",
    formula: "permissible switching overvoltage stated, or a measure against it; limit <= Us",
    explanation: "Closing on a trapped charge at the end of a long line gives three per unit and more. Silent below 300 kV, on lines \
                  shorter than the policy says (200 km), and where a limit, closing resistors, controlled closing or arresters are \
                  stated. A limit above the rated switching impulse level is a caution.",
    check: Check::Case(study),
};

/// From here the switching impulse governs (range II of IEC 60071-1, from memory).
const RANGE_TWO: f64 = 300e3;

fn study(case: &Case<'_>, findings: &mut Findings) {
    let Some(highest) = case.duty.system_voltage.as_ref().filter(|u| u.value.si() >= RANGE_TWO * (1.0 - EQUAL)) else {
        return;
    };
    if let Some((limit, place, text)) = permissible(case, highest.value) {
        let stated = case.breaker.quantity::<ElectricPotential>(&breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE);
        let Some(level) = stated.filter(|us| limit.si() > us.value.si() * (1.0 + EQUAL)) else { return };
        let message = format!(
            "the switching overvoltage may be {}, more than the switching impulse level of {}",
            level.like(limit),
            level.measure
        );
        findings
            .add(&SWITCHING_OVERVOLTAGE_STUDY, level.place(), message)
            .kind(FindingKind::Caution)
            .label("below the overvoltage that is permitted")
            .stated(&level.measure)
            .needed(Datum { text: level.like(limit), si: Some(limit.si()) })
            .working(text)
            .related(place, "the limit")
            .advice("lower the limit by closing resistors, controlled closing or arresters, or raise the level");
        return;
    }
    let controlled =
        case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word.starts_with("closing"));
    let arresters = case.system.mentions(&system::ARRESTER_SWITCHING_PROTECTIVE_LEVEL);
    if controlled
        || arresters
        || case.breaker.mentions(&breaker::CLOSING_RESISTOR)
        || case.system.mentions(&system::PERMISSIBLE_SWITCHING_OVERVOLTAGE)
    {
        return;
    }
    let measures = ["controlled closing", "closing resistor", "surge arresters", "staggered switching"];
    let long = case.circuits_of(&["overhead line", "overhead line with cable"]).find_map(|part| {
        let length = part.quantity::<Length>(&circuit::LENGTH)?;
        let long = length.value.si() >= case.policy.long_line * (1.0 - EQUAL) && !has_measure(case, part, &measures);
        long.then_some(length)
    });
    let Some(length) = long else { return };
    let message = format!(
        "a line of {} at {} is closed, and nothing limits the switching overvoltage nor says that a study found none needed",
        length.measure,
        highest.value.show()
    );
    findings
        .add(&SWITCHING_OVERVOLTAGE_STUDY, length.place(), message)
        .label("what limits the surge?")
        .related(case.sheet.heading, "the breaker")
        .advice("add permissible switching overvoltage to the system with the result of a study, or a measure to the breaker");
}

/// The permissible switching overvoltage as a crest to earth, with its working.
fn permissible(
    case: &Case<'_>,
    highest: ElectricPotential,
) -> Option<(ElectricPotential, crate::source::Place, String)> {
    if let Some(stated) = case.system.quantity::<ElectricPotential>(&system::PERMISSIBLE_SWITCHING_OVERVOLTAGE) {
        return Some((stated.value, stated.place(), String::new()));
    }
    let stated = case.system.quantity::<Ratio>(&system::PERMISSIBLE_SWITCHING_OVERVOLTAGE)?;
    let limit = crest(highest) * stated.value.si();
    let text = format!("{} x {} x sqrt(2/3) = {}", stated.measure, highest.show(), limit.show());
    Some((limit, stated.place(), text))
}

/// Vacuum and windings need surge protection.
pub static VACUUM_SURGE_PROTECTION: Rule = Rule {
    name: "vacuum-surge-protection",
    title: "Where a vacuum interrupter switches a transformer or a motor, surge protection is stated.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-110, IEC/TR 62271-306 (from memory); common practice",
    formula: "vacuum admitted, and transformer, motor or arc furnace: surge arresters, RC snubber or another measure",
    explanation: "Chopping and repeated reignition put steep surges upon the first turns of a winding. A measure that is none is accepted \
                  as a choice. Silent where vacuum is not among the interrupters admitted, where a measure is stated for the breaker \
                  or the circuit, and where the circuit stated is the cable to it.",
    check: Check::Case(vacuum),
};

/// Circuits whose windings are close to the breaker.
const WINDINGS: [&str; 3] = ["transformer", "motor", "arc furnace"];

fn vacuum(case: &Case<'_>, findings: &mut Findings) {
    let Some((_, interrupter)) =
        case.breaker.words(&breaker::INTERRUPTER).filter(|(words, _)| words.contains(&"vacuum"))
    else {
        return;
    };
    let bare = |part: &&Part<'_>| !mitigation(case, part);
    let Some((kind, statement)) = case.circuits_of(&WINDINGS).find(bare).and_then(|part| kind_of(part)) else { return };
    let article = if kind.starts_with('a') { "an" } else { "a" };
    let message = format!("vacuum is to switch {article} {kind}, and no surge protection is stated");
    findings
        .add(&VACUUM_SURGE_PROTECTION, statement.value, message)
        .label("what protects the winding?")
        .beside(interrupter, "the interrupter")
        .related(case.sheet.heading, "the breaker")
        .advice("add surge protection to the circuit: surge arresters, or RC snubber; or none where a study shows it");
}

/// Distances in air hold the rated levels.
pub static PHASE_SPACING: Rule = Rule {
    name: "phase-spacing",
    title: "Phase spacing and clearance to earth are not below the clearance for the rated impulse levels.",
    kind: FindingKind::Caution,
    basis: "IEC 60071-2 annex A, IEC 61936-1 (from memory)",
    formula: "spacing >= clearance(Up), clearance(Us); levels stated for the site times Ka",
    explanation: "The spacing is from centre to centre, so that the clearance is less than it: what is below the table is short in any \
                  case. Levels rated for up to 1000 m bring their clearance with them; levels stated for the altitude of the site are \
                  raised by Ka. A smaller distance needs a test, which is the reason to be given. Silent without a spacing or a \
                  clearance, and for enclosed apparatus.",
    check: Check::Case(spacing),
};

fn spacing(case: &Case<'_>, findings: &mut Findings) {
    // Cubicles are tested as a whole, outdoors too.
    let cubicle = ["metal-enclosed", "metal-clad"].iter().any(|word| case.is_built(word));
    if cubicle || !stands_in_air(case) {
        return;
    }
    let lightning = (&breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE, WithstandVoltage::LightningImpulse);
    let to_earth = (&breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE, WithstandVoltage::SwitchingToEarth);
    let between =
        (&breaker::SWITCHING_IMPULSE_WITHSTAND_VOLTAGE_BETWEEN_PHASES, WithstandVoltage::SwitchingBetweenPhases);
    let spaced = case.breaker.quantity::<Length>(&breaker::PHASE_SPACING);
    let cleared = case.site.quantity::<Length>(&site::CLEARANCE_TO_EARTH);
    for (stated, levels) in [(spaced, [lightning, between]), (cleared, [lightning, to_earth])] {
        let Some(stated) = stated else { continue };
        let worst = levels
            .iter()
            .filter_map(|(particular, withstand)| needed(case, particular, *withstand))
            .max_by(|a, b| a.0.si().total_cmp(&b.0.si()));
        let Some((least, level, working)) = worst.filter(|worst| worst.0.si() > stated.value.si() * (1.0 + EQUAL))
        else {
            continue;
        };
        let message = format!(
            "{} of {} is below the clearance for {}, {}",
            stated.statement.particular.label,
            stated.measure,
            level.measure,
            stated.like(least)
        );
        let finding = findings.add(&PHASE_SPACING, stated.place(), message);
        finding.label("below the table of clearances").stated(&stated.measure);
        finding.needed(Datum { text: stated.like(least), si: Some(least.si()) }).working(working);
        finding.related(level.place(), "the rated level").related(case.sheet.heading, "the breaker");
        finding.advice("a smaller distance has to be shown by a test: give that as the reason");
        finding.replace_by(stated.like(least));
    }
}

/// The clearance for a rated level, with the level and the working.
fn needed<'a>(
    case: &'a Case<'_>,
    particular: &Particular,
    withstand: WithstandVoltage,
) -> Option<(Length, Stated<'a, ElectricPotential>, String)> {
    let level = case.breaker.quantity::<ElectricPotential>(particular)?;
    let height = case.site.quantity::<Length>(&site::ALTITUDE).filter(|_| stated_for_site(case));
    let factor = height.zip(altitude_exponent(withstand)).map(|(height, m)| altitude_factor(height.value, m));
    let factor = factor.unwrap_or(1.0);
    let least = clearance(withstand, level.value * factor)?;
    let raised = if factor > 1.0 + EQUAL {
        format!(" x Ka {} for the altitude of the site", significant(factor, 4))
    } else {
        String::new()
    };
    let working = format!("clearance of {}{raised}: {} mm", level.measure, significant(least.si() * 1e3, 4));
    Some((least, level, working))
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::Policy;
    use crate::rules::testing::Bay;

    fn long(length: &str) -> Bay {
        Bay::new()
            .set("system", "highest voltage", "420 kV")
            .set("breaker", "rated voltage", "420 kV")
            .set("circuit", "length", length)
    }

    #[test]
    fn long_lines_have_a_limit() {
        let rule = "switching-overvoltage-study";
        assert_eq!(long("200 km").one(rule).kind, FindingKind::Remark);
        long("199 km").silent(rule);
        long("250 km").set("breaker", "closing resistor", "400 ohm").silent(rule);
        long("250 km").set("breaker", "controlled switching", "closing").silent(rule);
        long("250 km").set("breaker", "overvoltage mitigation", "surge arresters").silent(rule);
        Bay::new().set("circuit", "length", "250 km").silent(rule);
        let short = Policy { long_line: 100e3, ..Policy::default() };
        assert!(long("150 km").findings_with(short).iter().any(|finding| finding.rule == rule));
    }

    /// 2.5 per unit at 420 kV are 857 kV, 3.2 are 1097 kV (own calculation).
    #[test]
    fn a_limit_below_the_switching_level() {
        let rule = "switching-overvoltage-study";
        let bay = |limit: &str| {
            long("250 km").set("system", "permissible switching overvoltage", limit).set(
                "breaker",
                "rated switching impulse withstand voltage",
                "1050 kV",
            )
        };
        bay("2.5 pu").silent(rule);
        let finding = bay("3.2 pu").one(rule);
        assert_eq!(finding.kind, FindingKind::Caution);
        assert!(finding.message.contains("1097 kV"), "{}", finding.message);
        bay("1050 kV").silent(rule);
        bay("1060 kV").one(rule);
    }

    #[test]
    fn vacuum_and_windings() {
        let rule = "vacuum-surge-protection";
        let bay = |kind: &str| {
            Bay::new()
                .set("circuit", "kind", kind)
                .set("circuit", "auto-reclosing", "none")
                .without("circuit", "auto-reclosing dead time")
                .set("breaker", "interrupter", "vacuum")
        };
        for kind in ["transformer", "motor", "arc furnace"] {
            assert_eq!(bay(kind).one(rule).kind, FindingKind::Caution);
            bay(kind).set("circuit", "surge protection", "surge arresters").silent(rule);
            bay(kind).set("breaker", "overvoltage mitigation", "RC snubber").silent(rule);
            bay(kind).set("breaker", "interrupter", "self-blast").silent(rule);
        }
        bay("transformer").set("circuit", "surge protection", "none").silent(rule);
        bay("cable").silent(rule);
    }

    /// 2.0 m between poles with 1300 kV: 2600 mm (IEC 60071-2 table A.1, from memory).
    #[test]
    fn distances_in_air() {
        let rule = "phase-spacing";
        let bay = |spacing: &str| {
            Bay::new().set("breaker", "rated lightning impulse withstand voltage", "1300 kV").set(
                "breaker",
                "phase spacing",
                spacing,
            )
        };
        let finding = bay("2.0 m").one(rule);
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Caution, "2.6 m"));
        bay("2600 mm").silent(rule);
        bay("2590 mm").one(rule);
        bay("2.0 m").set("breaker", "construction", "gas-insulated").silent(rule);
        bay("2.0 m").set("breaker", "construction", "metal-enclosed").silent(rule);
        bay("2.0 m").set("breaker", "reason for phase spacing", "\"tested with 2 m\"").silent(rule);
        Bay::new().silent(rule);
    }

    #[test]
    fn clearances_and_the_altitude() {
        let rule = "phase-spacing";
        let bay = |clearance: &str| Bay::new().set("site", "clearance to earth", clearance);
        bay("1300 mm").silent(rule);
        assert_eq!(bay("1200 mm").one(rule).edits[0].text, "1300 mm");
        // A rated level brings its clearance with it, a level at the site is raised: 650 kV x 1.13 = 735 kV.
        bay("1300 mm").set("site", "altitude", "2000 m").silent(rule);
        let raised =
            bay("1300 mm").set("site", "altitude", "2000 m").set("breaker", "insulation stated for", "site altitude");
        assert!(raised.one(rule).message.contains("1470 mm"), "{}", raised.one(rule).message);
    }

    /// 1575 kV between phases: 3600 mm, more than the 2850 mm of 1425 kV lightning (IEC 60071-2 tables A.1 and A.3, from memory).
    #[test]
    fn switching_impulses_between_phases() {
        let rule = "phase-spacing";
        let bay = |spacing: &str| {
            Bay::new()
                .set("breaker", "rated lightning impulse withstand voltage", "1425 kV")
                .set("breaker", "switching impulse withstand voltage between phases", "1575 kV")
                .set("breaker", "phase spacing", spacing)
        };
        assert_eq!(bay("3.0 m").one(rule).edits[0].text, "3.6 m");
        bay("3.6 m").silent(rule);
    }
}
