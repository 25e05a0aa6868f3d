//! What must not be reported: specifications that look odd and are right. Each gives no contradiction, shortfall, omission or caution.

use super::testing::Bay;
use crate::finding::FindingKind;

#[track_caller]
fn nothing_grave(bay: &Bay) {
    let grave: Vec<String> = bay
        .findings()
        .iter()
        .filter(|finding| finding.kind < FindingKind::Excess)
        .map(|finding| format!("{}: {}", finding.rule, finding.message))
        .collect();
    assert!(grave.is_empty(), "{grave:#?}\n{}", bay.text());
}

/// A factor of 1.5 in an effectively earthed network up to 170 kV.
#[test]
fn a_higher_first_pole_factor_up_to_170_kv() {
    nothing_grave(&Bay::new().set("breaker", "first-pole-to-clear factor", "1.5"));
}

/// A level off the row of its voltage because of altitude; internal insulation is not corrected at all.
#[test]
fn levels_for_the_altitude() {
    let high = Bay::new().set("site", "altitude", "1800 m");
    let raised = high
        .clone()
        .set("breaker", "rated lightning impulse withstand voltage", "750 kV")
        .set("breaker", "rated short-duration power-frequency withstand voltage", "315 kV")
        .set("breaker", "lightning impulse level needed on site", "650 kV")
        .set("breaker", "power-frequency level needed on site", "275 kV");
    nothing_grave(&raised);
    nothing_grave(&high.clone().set("breaker", "construction", "gas-insulated").set(
        "breaker",
        "short-line fault",
        "required",
    ));
    high.set("breaker", "external insulation", "none").silent("insulation-altitude");
}

/// 3 s, M2, C2, or a higher class than the duty asks for: an excess at most.
#[test]
fn more_than_the_duty_asks_for() {
    nothing_grave(
        &Bay::new()
            .set("breaker", "rated short-time withstand current", "31.5 kA for 3 s")
            .set("breaker", "classes", "C2, M2")
            .set("breaker", "rated line-charging breaking current", "160 A")
            .set("breaker", "capacitive voltage factor", "1.4"),
    );
}

/// Cable, transformer and reactor bays do not reclose, and their sequence says so.
#[test]
fn bays_that_do_not_reclose() {
    for kind in ["cable", "transformer", "shunt reactor"] {
        let bay = Bay::new()
            .set("circuit", "kind", kind)
            .set("circuit", "auto-reclosing", "none")
            .without("circuit", "auto-reclosing dead time")
            .without("circuit", "source at far end")
            .without("breaker", "rated line-charging breaking current")
            .without("breaker", "short-line fault")
            .without("breaker", "rated out-of-phase breaking current")
            .without("breaker", "out-of-phase voltage factor")
            .set("breaker", "rated operating sequence", "O - 3 min - CO - 3 min - CO")
            .set("breaker", "overvoltage mitigation", "controlled opening, surge arresters")
            .set("tender", "standards", "IEC 62271-1:2017, IEC 62271-100:2021, IEC 62271-110:2017");
        let rating = match kind {
            "cable" => bay.set("breaker", "rated cable-charging breaking current", "160 A"),
            "shunt reactor" => bay.set("breaker", "shunt reactor breaking current", "315 A"),
            _ => bay,
        };
        nothing_grave(&rating);
    }
}

/// Small ratings of small duties stand beside a large short-circuit current. Without their object they are an excess.
#[test]
fn small_duties_beside_a_large_current() {
    let rated = Bay::new()
        .set("breaker", "shunt reactor breaking current", "315 A")
        .set("breaker", "rated cable-charging breaking current", "160 A")
        .set("breaker", "rated capacitor bank breaking current", "400 A");
    nothing_grave(&rated);
    assert_eq!(rated.of("capacitive-rating-needless").len(), 3);
    let bank = Bay::new()
        .set("circuit", "kind", "capacitor bank")
        .set("circuit", "bank power", "60 Mvar")
        .set("circuit", "auto-reclosing", "none")
        .set("breaker", "rated capacitor bank breaking current", "400 A");
    for rule in ["bank-current", "bank-continuous-current", "inrush-current", "capacitive-rating-needless"] {
        bank.silent(rule);
    }
}

/// Resonant-earthed systems from 12 to 36 kV with class S1, factor 1.5, E2 without reclosing.
#[test]
fn resonant_earthed_cable_networks() {
    for (nominal, highest, ud, up) in [
        ("10 kV", "12 kV", "28 kV", "75 kV"),
        ("20 kV", "24 kV", "50 kV", "125 kV"),
        ("30 kV", "36 kV", "70 kV", "170 kV"),
    ] {
        let bay = Bay::new()
            .set("system", "nominal voltage", nominal)
            .set("system", "highest voltage", highest)
            .set("system", "neutral", "resonant earthed")
            .without("system", "X0/X1")
            .set("system", "single-phase short-circuit current", "0.1 kA")
            .set("system", "connection", "cables")
            .set("site", "installation", "indoor")
            .set("breaker", "rated voltage", highest)
            .set("breaker", "construction", "metal-enclosed")
            .set("breaker", "interrupter", "vacuum")
            .set("breaker", "internal arc classification", "AFLR")
            .set("breaker", "internal arc current", "31.5 kA")
            .set("breaker", "internal arc duration", "1 s")
            .set("breaker", "rated short-duration power-frequency withstand voltage", ud)
            .set("breaker", "rated lightning impulse withstand voltage", up)
            .set("breaker", "first-pole-to-clear factor", "1.5")
            .set("breaker", "classes", "C2, E2, M2, S1")
            .set("breaker", "rated operating sequence", "O - 3 min - CO - 3 min - CO")
            .without("breaker", "short-line fault")
            .without("breaker", "rated out-of-phase breaking current")
            .without("breaker", "out-of-phase voltage factor")
            .without("breaker", "rated line-charging breaking current")
            .without("breaker", "temperature class")
            .set("breaker", "rated cable-charging breaking current", "31.5 A")
            .set("circuit", "kind", "cable")
            .set("circuit", "length", "4 km")
            .set("circuit", "capacitance per length", "0.3 uF/km")
            .set("circuit", "auto-reclosing", "none")
            .without("circuit", "auto-reclosing dead time")
            .without("circuit", "source at far end");
        nothing_grave(&bay);
    }
}

/// A rating under the current of the whole bus, where the breaker's own share is documented.
#[test]
fn a_documented_share_of_the_bus_current() {
    let bus = Bay::new().set("system", "short-circuit current", "33 kA").set(
        "system",
        "single-phase short-circuit current",
        "30 kA",
    );
    bus.one("breaking-current-below-duty");
    nothing_grave(&bus.set("breaker", "short-circuit current through the breaker", "27 kA"));
}

/// A generator circuit-breaker with 2.74 and 133 ms to its own standard.
#[test]
fn a_generator_breaker_to_its_own_standard() {
    let bay = Bay::new()
        .set("breaker", "construction", "generator circuit-breaker")
        .set("breaker", "standards", "IEC/IEEE 62271-37-013:2021")
        .set("breaker", "DC time constant", "133 ms")
        .set("breaker", "rated short-circuit making current", "86.3 kA")
        .set("breaker", "rated peak withstand current", "86.3 kA");
    for rule in [
        "making-current-factor",
        "making-current-below-duty",
        "peak-withstand-disagrees",
        "dc-time-constant",
        "dc-time-constant-excess",
        "generator-breaker-standard",
        "many-extremes",
    ] {
        bay.silent(rule);
    }
    bay.set("breaker", "rated short-circuit making current", "78.75 kA").one("making-current-factor");
}

/// Levels of the gas that fall in order: below the dew point of the filling only, a remark at most; at the alarm's, a caution; at the
/// minimum functional level's, a shortfall.
#[test]
fn gas_is_graded_by_its_levels() {
    let at = |lowest: &str| {
        Bay::new()
            .set("site", "lowest ambient", lowest)
            .set("breaker", "temperature class", "minus 40 outdoor")
            .set("breaker", "insulating gas", "SF6")
            .set("breaker", "rated filling pressure", "6.0 bar gauge at 20 degC")
            .set("breaker", "alarm pressure", "5.5 bar gauge at 20 degC")
            .set("breaker", "minimum functional pressure", "5.2 bar gauge at 20 degC")
    };
    // The dew points are those of 0.701, 0.651 and 0.621 MPa abs: -26.1, -28.5 and -30.0 degC.
    nothing_grave(&at("-25 degC"));
    assert_eq!(at("-27 degC").one("gas-liquefaction").kind, FindingKind::Remark);
    assert_eq!(at("-29 degC").one("gas-density-at-cold").kind, FindingKind::Caution);
    assert_eq!(at("-31 degC").one("gas-liquefaction").kind, FindingKind::Shortfall);
}

/// A national rated voltage with agreed levels, where the text cites the national standard.
#[test]
fn a_national_voltage() {
    let bay = Bay::new().set("breaker", "rated voltage", "82.5 kV").set("system", "highest voltage", "82.5 kV").set(
        "system",
        "nominal voltage",
        "77 kV",
    );
    assert_eq!(bay.one("rated-voltage-not-preferred").kind, FindingKind::Caution);
    let cited = bay.set("tender", "standards", "IEC 62271-100:2021, national standard of the utility");
    assert_eq!(cited.one("rated-voltage-not-preferred").kind, FindingKind::Remark);
}
