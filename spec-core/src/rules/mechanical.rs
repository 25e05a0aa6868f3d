//! Rules on construction, earthquakes, mechanical loads and corrosion.

use super::{Check, EQUAL, Rule, add_line, number, outdoors};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{breaker, site};
use crate::quantity::{Acceleration, ElectricCurrent, ElectricPotential, Force, Length, Physical, Ratio};
use crate::standards::{seismic_level, seismic_level_for, terminal_loads, zinc_coating};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &SEISMIC_LEVEL,
    &TERMINAL_LOAD,
    &BUSHING_TRANSFORMERS,
    &LIVE_PART_HEIGHT,
    &CORROSION_PROTECTION,
    &INTERNAL_ARC_CLASS,
];

/// The seismic qualification covers the site.
pub static SEISMIC_LEVEL: Rule = Rule {
    name: "seismic-level",
    title: "The seismic qualification is not below the acceleration of the site.",
    kind: FindingKind::Shortfall,
    basis: "IEEE 693 (public notes), IEC TR 62271-300 (from memory)",
    formula: "design level >= ground acceleration: low 0.1 g, moderate 0.25 g, high 0.5 g",
    explanation: "The acceleration of the site is compared with the design level, not with the performance level, which is twice as \
                  high. Where no qualification is stated and the site exceeds the low level, it is an omission. Silent where the \
                  site states no acceleration, or none.",
    check: Check::Case(seismic),
};

fn seismic(case: &Case<'_>, findings: &mut Findings) {
    let Some(ground) = case.site.quantity::<Acceleration>(&site::SEISMIC_ACCELERATION) else { return };
    let level = seismic_level_for(ground.value);
    let asked = &breaker::SEISMIC_QUALIFICATION;
    if !case.breaker.mentions(asked) {
        let low = seismic_level("low").is_some_and(|low| ground.value.si() <= low.si() * (1.0 + EQUAL));
        if low {
            return;
        }
        let message =
            format!("the ground accelerates by {}, and no seismic qualification is asked for", ground.measure);
        let finding = findings.add(&SEISMIC_LEVEL, ground.place(), message);
        finding.kind(FindingKind::Omission).label("qualified for what?").related(case.sheet.heading, "the breaker");
        let text = level.map_or_else(|| ground.measure.to_string(), |(word, _)| word.to_owned());
        finding.needed(text.as_str());
        add_line(finding, case.sheet, asked, &text);
        return;
    }
    let by_word = case.breaker.word(asked).and_then(|(word, statement)| {
        seismic_level(word).map(|design| (design, word.to_owned(), statement, level.map(|(word, _)| word.to_owned())))
    });
    let by_value = || {
        case.breaker
            .quantity::<Acceleration>(asked)
            .map(|v| (v.value, v.measure.to_string(), v.statement, Some(v.like(ground.value))))
    };
    let Some((design, stated, statement, needed)) = by_word.or_else(by_value) else { return };
    if design.si() >= ground.value.si() * (1.0 - EQUAL) {
        return;
    }
    let shown = ground.like(design);
    let message = format!("the seismic qualification {stated} ({shown}) is below the {} of the site", ground.measure);
    let finding = findings.add(&SEISMIC_LEVEL, statement.value, message);
    finding.label("below the site").stated(stated.as_str()).beside(ground.statement, "the acceleration of the site");
    finding.working(format!("{shown} < {}", ground.measure));
    match needed {
        Some(needed) => {
            finding.needed(needed.as_str()).replace_by(needed);
        }
        None => {
            finding.needed(Datum::from(&ground.measure)).advice("no level reaches it: state the acceleration itself");
        }
    }
}

/// The static loads on the terminals are stated.
pub static TERMINAL_LOAD: Rule = Rule {
    name: "terminal-load",
    title: "The static loads on the terminals are stated in all three directions.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-100:2008 6.101.6 (examples, from memory)",
    formula: "longitudinal, transverse and vertical load, each at least the example for Ur and Ir",
    explanation: "Pull of the conductors, wind, ice and short-circuit forces act on the terminals. Where nothing is stated, the \
                  bidder takes the examples of the standard. Silent indoors, where no outdoor terminals are admitted, and for \
                  voltages that the examples leave out.",
    check: Check::Case(loads),
};

/// Constructions with terminals in open air that conductors pull at.
const OPEN_TERMINALS: [&str; 3] = ["live tank", "dead tank", "disconnecting"];

fn loads(case: &Case<'_>, findings: &mut Findings) {
    let (Some(_), Some(rated), Some(current), Some((construction, built))) = (
        outdoors(case),
        case.rated_voltage(),
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT),
        case.breaker.words(&breaker::CONSTRUCTION),
    ) else {
        return;
    };
    let open = construction.iter().any(|word| OPEN_TERMINALS.contains(word));
    let Some(examples) = terminal_loads(rated.value, current.value).filter(|_| open) else { return };
    let directions = [
        ("longitudinal", &breaker::STATIC_TERMINAL_LOAD_LONGITUDINAL, examples.longitudinal),
        ("transverse", &breaker::STATIC_TERMINAL_LOAD_TRANSVERSE, examples.transverse),
        ("vertical", &breaker::STATIC_TERMINAL_LOAD_VERTICAL, examples.vertical),
    ];
    let missing: Vec<_> = directions.iter().filter(|(_, particular, _)| !case.breaker.mentions(particular)).collect();
    if !missing.is_empty() {
        let said: Vec<String> = missing.iter().map(|(way, _, load)| format!("{way} {}", newtons(*load))).collect();
        let ways: Vec<&str> = missing.iter().map(|(way, _, _)| *way).collect();
        let message = format!(
            "the static terminal load is not stated ({}); the examples of the standard at {} and {} are {}",
            ways.join(", "),
            rated.measure,
            current.measure,
            said.join(", ")
        );
        let finding = findings.add(&TERMINAL_LOAD, built.value, message);
        finding.label("what pulls at the terminals?");
        let lines: Vec<String> = missing
            .iter()
            .map(|(_, particular, load)| format!("    {}: {}", particular.label, newtons(*load)))
            .collect();
        finding.edit("add the loads of the examples", case.sheet.end, format!("\n{}", lines.join("\n")));
    }
    for (way, particular, example) in directions {
        let Some(stated) = case.breaker.quantity::<Force>(particular) else { continue };
        if stated.value.si() >= example.si() * (1.0 - EQUAL) {
            continue;
        }
        let text = stated.like(example);
        let message = format!(
            "a {way} load of {} is below the {text} that the standard gives as its example for {} and {}",
            stated.measure, rated.measure, current.measure
        );
        findings
            .add(&TERMINAL_LOAD, stated.place(), message)
            .label("below the example of the standard")
            .stated(&stated.measure)
            .needed(Datum { text: text.clone(), si: Some(example.si()) })
            .replace_by(text);
    }
}

fn newtons(force: Force) -> String {
    format!("{} N", crate::quantity::significant(force.si(), 4))
}

/// Bushing current transformers need bushings.
pub static BUSHING_TRANSFORMERS: Rule = Rule {
    name: "bushing-transformers",
    title: "Bushing current transformers are asked for only where the construction has bushings.",
    kind: FindingKind::Contradiction,
    basis: "construction of live-tank circuit-breakers",
    formula: "number of bushing current transformers = 0 where only live tank is admitted",
    explanation: "A live-tank breaker has no bushing around which a ring core could sit; it stands beside a free-standing current \
                  transformer. Silent where another construction is admitted too.",
    check: Check::Case(bushings),
};

fn bushings(case: &Case<'_>, findings: &mut Findings) {
    let (Some(number_of), Some((construction, built))) = (
        case.breaker.quantity::<Ratio>(&breaker::BUSHING_CURRENT_TRANSFORMERS),
        case.breaker.words(&breaker::CONSTRUCTION),
    ) else {
        return;
    };
    if number_of.value.si() < 1.0 || construction.iter().any(|word| *word != "live tank") {
        return;
    }
    let message = format!(
        "{} bushing current transformers are asked for, and a live-tank breaker has no bushings",
        number(&number_of)
    );
    findings
        .add(&BUSHING_TRANSFORMERS, number_of.place(), message)
        .label("no bushings to put them on")
        .stated(number(&number_of))
        .needed("0")
        .beside(built, "the construction")
        .advice("admit dead tank, or ask for free-standing current transformers with the bay")
        .replace_by("0");
}

/// Live parts are high enough.
pub static LIVE_PART_HEIGHT: Rule = Rule {
    name: "live-part-height",
    title: "The live parts of the breaker stand as high as the station keeps them.",
    kind: FindingKind::Caution,
    basis: "IEC 61936-1 (from memory)",
    formula: "height >= the station's, else 2.25 m + clearance to earth",
    explanation: "Compared with the height of live parts that the site states; else with 2.25 m, which a raised hand does not reach, \
                  and the clearance to earth where it is stated. Silent where no height of the breaker's live parts is stated.",
    check: Check::Case(height),
};

/// Out of reach of a raised hand, m (IEC 61936-1, from memory).
const OUT_OF_REACH: f64 = 2.25;

fn height(case: &Case<'_>, findings: &mut Findings) {
    let Some(height) = case.breaker.quantity::<Length>(&breaker::LIVE_PART_HEIGHT_OF_THE_BREAKER) else { return };
    let station = case.site.quantity::<Length>(&site::HEIGHT_OF_LIVE_PARTS);
    let clearance = case.site.quantity::<Length>(&site::CLEARANCE_TO_EARTH);
    let least = match (&station, &clearance) {
        (Some(station), _) => station.value,
        (None, Some(clearance)) => Length::from_si(OUT_OF_REACH) + clearance.value,
        (None, None) => Length::from_si(OUT_OF_REACH),
    };
    if height.value.si() >= least.si() * (1.0 - EQUAL) {
        return;
    }
    let text = height.like(least);
    let message = format!("the lowest live part stands at {}, and it has to stand at {text}", height.measure);
    let finding = findings.add(&LIVE_PART_HEIGHT, height.place(), message);
    finding.label("too low").stated(&height.measure).needed(Datum { text: text.clone(), si: Some(least.si()) });
    match (station, clearance) {
        (Some(station), _) => {
            finding.beside(station.statement, "the height that the station keeps");
        }
        (None, Some(clearance)) => {
            finding.beside(clearance.statement, "the clearance to earth");
            finding.working(format!("2.25 m + {} = {text}", clearance.measure));
        }
        (None, None) => {}
    }
    finding.advice("ask for a higher structure").replace_by(text);
}

/// Steel is protected as the air of the site asks for.
pub static CORROSION_PROTECTION: Rule = Rule {
    name: "corrosion-protection",
    title: "The zinc on steel suits the corrosivity of the site.",
    kind: FindingKind::Remark,
    basis: "ISO 1461, ISO 9223 (from memory); common practice",
    formula: "zinc >= 70 um in C4, 86 um in C5, 100 um in CX",
    explanation: "By the sea zinc goes at some micrometres a year. In C5 and CX a coating is asked for where none is stated. Silent in \
                  milder air, and where the site states no category. Take more zinc, or a paint system upon it.",
    check: Check::Case(corrosion),
};

fn corrosion(case: &Case<'_>, findings: &mut Findings) {
    let Some((category, air)) = case.site.word(&site::CORROSION) else { return };
    let Some(least) = zinc_coating(category) else { return };
    let text = format!("{} um", crate::quantity::significant(least.si() * 1e6, 3));
    match case.breaker.quantity::<Length>(&breaker::ZINC_COATING) {
        Some(zinc) if zinc.value.si() < least.si() * (1.0 - EQUAL) => {
            let message = format!(
                "{} of zinc do not last in air of category {category}: {text}, or a paint system",
                zinc.measure
            );
            findings
                .add(&CORROSION_PROTECTION, zinc.place(), message)
                .label("little for this air")
                .stated(&zinc.measure)
                .needed(Datum { text: text.clone(), si: Some(least.si()) })
                .beside(air, "the corrosivity of the site")
                .advice("or ask for a paint system upon the zinc")
                .replace_by(text);
        }
        None if matches!(category, "C5" | "CX") && !case.breaker.mentions(&breaker::ZINC_COATING) => {
            let message = format!("the air is of category {category}, and no protection of the steel is asked for");
            let finding = findings.add(&CORROSION_PROTECTION, air.value, message);
            finding.label("what protects the steel?").needed(text.as_str()).related(case.sheet.heading, "the breaker");
            add_line(finding, case.sheet, &breaker::ZINC_COATING, &text);
        }
        _ => {}
    }
}

/// Metal-enclosed switchgear has its internal arc class.
pub static INTERNAL_ARC_CLASS: Rule = Rule {
    name: "internal-arc-class",
    title: "Metal-enclosed switchgear up to 52 kV has an internal arc class, with current and duration.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-200 (from memory)",
    formula: "IAC with sides, kA and s",
    explanation: "The class says on which sides people are safe, and up to what current and time. Silent above 52 kV, where only \
                  standards of the IEEE are cited, and for constructions that are not metal-enclosed.",
    check: Check::Case(internal_arc),
};

/// The class is of metal-enclosed switchgear up to here (scope of IEC 62271-200, from memory).
const METAL_ENCLOSED_TO: f64 = 52e3;

/// Constructions to which the class applies.
const METAL_ENCLOSED: [&str; 2] = ["metal-enclosed", "metal-clad"];

fn internal_arc(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some((construction, built))) = (case.rated_voltage(), case.breaker.words(&breaker::CONSTRUCTION))
    else {
        return;
    };
    let enclosed = construction.iter().any(|word| METAL_ENCLOSED.contains(word));
    if !enclosed || case.regimes().only_ieee() || rated.value > ElectricPotential::from_si(METAL_ENCLOSED_TO) {
        return;
    }
    let missing: Vec<&str> =
        [&breaker::INTERNAL_ARC_CLASSIFICATION, &breaker::INTERNAL_ARC_CURRENT, &breaker::INTERNAL_ARC_DURATION]
            .into_iter()
            .filter(|particular| !case.breaker.mentions(particular))
            .map(|particular| particular.label)
            .collect();
    if missing.is_empty() {
        return;
    }
    let class = case.breaker.statement(&breaker::INTERNAL_ARC_CLASSIFICATION);
    let message = if class.is_some() {
        format!("the internal arc class has no {}", missing.join(" and no "))
    } else {
        format!("metal-enclosed switchgear for {} is asked for without an internal arc class", rated.measure)
    };
    let finding = findings.add(&INTERNAL_ARC_CLASS, class.unwrap_or(built).value, message);
    finding.label("safe on which sides, up to what current and time?").beside(rated.statement, "the rated voltage");
    finding.advice(format!("add {} (AFLR, the short-time current and 1 s are usual)", missing.join(" and ")));
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    #[test]
    fn earthquakes_against_the_design_level() {
        let bay = |site: &str, level: &str| {
            Bay::new().set("site", "seismic acceleration", site).set("breaker", "seismic qualification", level)
        };
        let finding = bay("0.25 g", "low").one("seismic-level");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert_eq!(finding.edits[0].text, "moderate");
        bay("0.25 g", "moderate").silent("seismic-level");
        bay("0.3 g", "0.3 g").silent("seismic-level");
        assert_eq!(bay("0.3 g", "0.2 g").one("seismic-level").edits[0].text, "0.3 g");
        assert!(bay("0.6 g", "high").one("seismic-level").edits.is_empty());
        bay("none", "low").silent("seismic-level");
    }

    #[test]
    fn a_qualification_that_is_not_asked_for() {
        let finding = Bay::new().set("site", "seismic acceleration", "0.3 g").one("seismic-level");
        assert_eq!(finding.kind, FindingKind::Omission);
        assert_eq!(finding.edits[0].text, "\n    seismic qualification: high");
        Bay::new().set("site", "seismic acceleration", "0.1 g").silent("seismic-level");
    }

    #[test]
    fn loads_on_the_terminals() {
        let all = Bay::new()
            .set("breaker", "static terminal load longitudinal", "1250 N")
            .set("breaker", "static terminal load transverse", "750 N")
            .set("breaker", "static terminal load vertical", "1000 N");
        all.silent("terminal-load");
        let one = all.clone().without("breaker", "static terminal load longitudinal").one("terminal-load");
        assert_eq!(one.edits[0].text, "\n    static terminal load longitudinal: 1250 N");
        assert_eq!(one.kind, FindingKind::Remark);
        assert_eq!(
            all.clone().set("breaker", "static terminal load vertical", "900 N").one("terminal-load").edits[0].text,
            "1000 N"
        );
        Bay::new().set("breaker", "construction", "gas-insulated").silent("terminal-load");
    }

    #[test]
    fn ring_cores_need_bushings() {
        let bay = |what: &str| {
            Bay::new().set("breaker", "bushing current transformers", "12").set("breaker", "construction", what)
        };
        bay("live tank").one("bushing-transformers");
        bay("dead tank").silent("bushing-transformers");
        bay("live tank or dead tank").silent("bushing-transformers");
        bay("live tank").set("breaker", "bushing current transformers", "0").silent("bushing-transformers");
    }

    #[test]
    fn live_parts_out_of_reach() {
        let bay = |height: &str| Bay::new().set("breaker", "live-part height of the breaker", height);
        bay("2.1 m").one("live-part-height");
        bay("2.25 m").silent("live-part-height");
        let finding = bay("3.2 m").set("site", "clearance to earth", "1300 mm").one("live-part-height");
        assert_eq!(finding.edits[0].text, "3.55 m");
        bay("3.55 m").set("site", "clearance to earth", "1300 mm").silent("live-part-height");
        bay("4.0 m").set("site", "height of live parts", "4.6 m").one("live-part-height");
    }

    #[test]
    fn zinc_by_the_sea() {
        let bay = |category: &str, zinc: &str| {
            Bay::new().set("site", "corrosion", category).set("breaker", "zinc coating", zinc)
        };
        assert_eq!(bay("C5", "65 um").one("corrosion-protection").edits[0].text, "86 um");
        bay("C5", "86 um").silent("corrosion-protection");
        bay("C3", "40 um").silent("corrosion-protection");
        Bay::new().set("site", "corrosion", "CX").one("corrosion-protection");
        Bay::new().set("site", "corrosion", "C4").silent("corrosion-protection");
    }

    #[test]
    fn internal_arcs_in_metal_enclosed_switchgear() {
        let bay =
            |ur: &str| Bay::new().set("breaker", "rated voltage", ur).set("breaker", "construction", "metal-enclosed");
        assert_eq!(bay("36 kV").one("internal-arc-class").kind, FindingKind::Omission);
        bay("52 kV").one("internal-arc-class");
        bay("72.5 kV").silent("internal-arc-class");
        let classed = bay("36 kV").set("breaker", "internal arc classification", "AFLR");
        assert!(classed.one("internal-arc-class").message.contains("duration"));
        classed
            .set("breaker", "internal arc current", "25 kA")
            .set("breaker", "internal arc duration", "1 s")
            .silent("internal-arc-class");
        bay("36 kV").set("tender", "standards", "IEEE C37.20.2:2015").silent("internal-arc-class");
    }
}
