//! The forms of values, in the spellings of both communities: what is read of each, and what is refused with which repair.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

use firstpole_core::quantity::Qualifier;
use firstpole_core::sheet::{QuantityReading, Reading};
use firstpole_core::{Assessment, Assessor, Finding, Sources};

fn assess(sheet: &str, lines: &str) -> Assessment {
    Assessor::standard().assess(&Sources::of("x.cbspec", format!("cbspec 1\n{sheet} X\n{lines}\n")))
}

/// Rules that speak of how a text is written.
fn reading_findings(assessment: &Assessment) -> Vec<&Finding> {
    let names: Vec<&str> = firstpole_core::rules::reading::ALL.iter().map(|rule| rule.name).collect();
    assessment.findings().iter().map(AsRef::as_ref).filter(|finding: &&Finding| names.contains(&finding.rule)).collect()
}

#[track_caller]
fn readings(sheet: &str, lines: &str) -> Vec<Reading> {
    let assessment = assess(sheet, lines);
    let said = reading_findings(&assessment);
    assert!(said.is_empty(), "{lines}: {said:#?}");
    assessment
        .set
        .sheets()
        .next()
        .expect("a sheet")
        .statements
        .iter()
        .map(|statement| statement.reading.clone())
        .collect()
}

#[track_caller]
fn quantity(sheet: &str, line: &str) -> QuantityReading {
    match readings(sheet, line).remove(0) {
        Reading::Quantity(quantity) => quantity,
        other => panic!("{line}: {other:?}"),
    }
}

#[track_caller]
fn si(sheet: &str, line: &str) -> f64 {
    quantity(sheet, line).measure.si.expect("a value")
}

/// The one finding about how a line is written.
#[track_caller]
fn refused(sheet: &str, line: &str) -> Finding {
    let assessment = assess(sheet, line);
    let said = reading_findings(&assessment);
    assert_eq!(said.len(), 1, "{line}: {said:#?}");
    said[0].clone()
}

fn repairs(finding: &Finding) -> Vec<&str> {
    finding.edits.iter().map(|edit| edit.text.as_str()).collect()
}

#[track_caller]
fn close(a: f64, b: f64) {
    assert!((a - b).abs() <= 1e-6 * b.abs(), "{a} is not {b}");
}

#[test]
fn peak_and_rms_in_their_spellings() {
    for value in ["650 kV", "650 kVp", "650 kV peak", "650 kV crest", "650 kVpk", "650kV peak"] {
        close(si("breaker", &format!("BIL: {value}")), 650e3);
    }
    for value in ["31.5 kA", "31.5 kA rms", "31.5 kA sym", "31.5 kA symmetrical", "31 500 A"] {
        close(si("breaker", &format!("Isc: {value}")), 31.5e3);
    }
    for value in ["82 kA peak", "82 kAp", "82 kA crest", "82 kA pk"] {
        close(si("breaker", &format!("closing and latching current: {value}")), 82e3);
    }
}

#[test]
fn pressures_of_all_trades() {
    let absolute = |value: &str| {
        let reading = quantity("breaker", &format!("fill pressure: {value}"));
        reading.absolute().expect("a pressure")
    };
    for value in
        ["0.6 MPa abs", "6 bar abs", "6 bar(a)", "6 bara", "600 kPa absolute", "6.11830 kg/cm2 abs", "87.0226 psia"]
    {
        let read = absolute(value);
        assert!(read.stated, "{value}");
        assert!((read.pressure.value - 600e3).abs() < 10.0, "{value}: {}", read.pressure.value);
    }
    for value in ["0.6 MPa gauge", "6 bar g", "6 bar(g)", "6 barg", "87.0226 psig", "6.11830 kg/cm² gauge", "6 bar rel"]
    {
        assert!((absolute(value).pressure.value - 701.3e3).abs() < 10.0, "{value}: {}", absolute(value).pressure.value);
    }
    assert!(!absolute("0.6 MPa").stated);
    let warm = quantity("breaker", "fill pressure: 0.5 MPa abs at 25 degC");
    close(warm.at.expect("a temperature").si.expect("a value"), 298.15);
}

#[test]
fn temperatures_and_their_signs() {
    for value in ["-40 degC", "−40 °C", "-40 degF", "–40 ℉", "233.15 K", "-40 C"] {
        close(si("site", &format!("lowest ambient: {value}")), 233.15);
    }
    let range = quantity("site", "ambient: -25 to 40 degC");
    close(range.lower().si.expect("a value"), 248.15);
    close(range.upper().si.expect("a value"), 313.15);
}

#[test]
fn times_and_cycles() {
    for (value, seconds) in [("45 ms", 0.045), ("0.3 s", 0.3), ("0.3 sec", 0.3), ("3 mins", 180.0), ("2 h", 7200.0)] {
        close(si("breaker", &format!("closing time: {value}")), seconds);
    }
    assert_eq!(quantity("breaker", "opening time: 2 cycles").measure.si, None, "no frequency is known here");
    let text = "cbspec 1\nsystem N\n frequency: 60 Hz\n highest voltage: 145 kV\nbreaker B\n break time: 3 cycles\n opening time: 3.1 cycles\n";
    let assessment = Assessor::standard().assess(&Sources::of("x.cbspec", text));
    let finding = assessment
        .findings()
        .iter()
        .find(|f| f.rule == "break-time-below-opening")
        .expect("50 ms is less than 51.7 ms");
    assert!(finding.message.contains("3 cycles"), "{}", finding.message);
}

#[test]
fn powers_with_their_voltage() {
    let level = quantity("system", "fault level: 2500 MVA at 110 kV");
    close(level.measure.si.expect("a value"), 2.5e9);
    close(level.at.expect("a voltage").si.expect("a value"), 110e3);
    close(si("system", "fault level: 4 GVA at 69 kV"), 4e9);
    for value in ["20 Mvar", "20 MVAr", "20 MVAR", "20 000 kvar"] {
        close(si("circuit", &format!("bank power: {value}")), 20e6);
    }
}

#[test]
fn small_units_and_units_over_units() {
    for value in ["40 uohm", "40 µΩ", "40 μΩ", "0.04 mohm"] {
        close(si("breaker", &format!("main circuit resistance: {value}")), 40e-6);
    }
    for value in ["2 kV/us", "2 kV/µs", "2000 V/us"] {
        close(si("breaker", &format!("RRRV: {value}")), 2e9);
    }
    for value in ["0.5 %/year", "0.5 % a year", "0.5 % per year", "0.5 % per annum"] {
        close(si("breaker", &format!("leakage rate: {value}")), 0.005 / (365.25 * 86_400.0));
    }
    let creepage = quantity("breaker", "SCD: 31 mm/kV phase-to-phase");
    assert!(creepage.is(Qualifier::PhaseToPhase));
    close(si("circuit", "capacitance per length: 0.25 µF/km"), 0.25e-9);
    close(si("circuit", "operations per day: 4"), 4.0 / 86_400.0);
}

#[test]
fn bounds_by_words_and_by_labels() {
    let statements = |lines: &str| {
        let assessment = assess("breaker", lines);
        assert!(reading_findings(&assessment).is_empty());
        assessment.findings().iter().filter(|f| f.rule == "stated-twice").count()
    };
    assert_eq!(statements(" minimum opening time: 20 ms\n maximum opening time: 30 ms"), 0);
    assert_eq!(statements(" opening time: at least 20 ms\n opening time: at most 30 ms"), 0);
    assert_eq!(statements(" opening time: 20 ms\n opening time: 30 ms"), 1);
    for value in
        ["at most 30 ms", "not more than 30 ms", "max. 30 ms", "<= 30 ms", "≤ 30 ms", "30 ms max", "up to 30 ms"]
    {
        close(si("breaker", &format!("opening time: {value}")), 0.030);
    }
    for value in ["93 to 121 V", "93-121 V", "93 – 121 V", "93 V to 121 V"] {
        let range = quantity("breaker", &format!("battery range: {value}"));
        close(range.upper().si.expect("a value"), 121.0);
    }
}

#[test]
fn two_in_one_and_sums() {
    let both = readings("breaker", " short-time current: 20 kA for 1 s");
    assert_eq!(both.len(), 2, "{both:?}");
    let Reading::Quantity(duration) = &both[1] else { panic!("{both:?}") };
    close(duration.measure.si.expect("a value"), 1.0);
    assert!(
        quantity("breaker", "lightning impulse withstand voltage across the open breaker: 1 050 + 170 kV")
            .second
            .is_some()
    );
    assert_eq!(refused("breaker", "rated voltage: 145 + 10 kV").rule, "unreadable-value");
    assert_eq!(refused("breaker", "rated voltage: 145 kV for 1 s").rule, "unreadable-value");
}

#[test]
fn words_yes_no_none_and_or() {
    assert_eq!(readings("system", "neutral: Effectively-Grounded"), [Reading::Words(vec!["effectively earthed"])]);
    assert_eq!(readings("system", "neutral: Petersen coil"), [Reading::Words(vec!["resonant earthed"])]);
    assert_eq!(
        readings("breaker", "construction: live tank or GIS"),
        [Reading::Words(vec!["live tank", "gas-insulated"])]
    );
    assert_eq!(
        readings("breaker", "construction: metal-enclosed withdrawable"),
        [Reading::Words(vec!["metal-enclosed", "withdrawable"])]
    );
    assert_eq!(readings("site", "pollution: d heavy"), [Reading::Words(vec!["d"])]);
    assert_eq!(readings("breaker", "SLF: required"), [Reading::YesNo(true)]);
    assert_eq!(readings("breaker", "closing resistor: none"), [Reading::None]);
    let finding = refused("system", "neutral: effectivly earthed");
    assert_eq!((finding.rule, repairs(&finding)), ("unknown-word", vec!["effectively earthed"]));
}

#[test]
fn classes_sequences_gases_dates() {
    let Reading::Classes(classes) = readings("breaker", "classes: c2, M2 , S1").remove(0) else { panic!("classes") };
    assert_eq!(classes.iter().map(ToString::to_string).collect::<Vec<_>>(), ["C2", "M2", "S1"]);
    let Reading::Sequence(sequence) = readings("breaker", "duty cycle: O-0.3sec-CO-3mins-CO").remove(0) else {
        panic!("sequence")
    };
    assert_eq!(sequence.to_string(), "O - 0.3 s - CO - 3 min - CO");
    let Reading::Gas(gases) = readings("breaker", "gas: C4F7N 3.5 % + O2 10 % + CO2 86.5 %").remove(0) else {
        panic!("gas")
    };
    assert_eq!(gases[0].portions.len(), 3);
    assert_eq!(readings("tender", "commissioning: 2028-02-29").len(), 1);
    assert_eq!(refused("tender", "commissioning: 2027-02-29").rule, "unreadable-value");
    assert_eq!(refused("tender", "commissioning: 09/2029").rule, "unreadable-value");
    assert_eq!(refused("breaker", "gas: SF6 60 % + N2 30 %").rule, "gas-shares");
    assert_eq!(refused("breaker", "gas: SF6 60 % + N2").rule, "gas-shares");
}

#[test]
fn a_decimal_comma_has_both_readings_as_repairs() {
    let finding = refused("breaker", "rated continuous current: 1,250 A");
    assert_eq!((finding.rule, repairs(&finding)), ("decimal-comma", vec!["1.250", "1250"]));
    assert_eq!(repairs(&refused("breaker", "Isc: 31,5 kA")), ["31.5"]);
    assert_eq!(repairs(&refused("breaker", "duty cycle: O - 0,3 s - CO - 3 min - CO")), ["0.3"]);
}

#[test]
fn units_that_are_missing_wrong_or_unknown() {
    let missing = refused("breaker", "fill pressure: 0.6");
    assert_eq!((missing.rule, repairs(&missing)[0]), ("unit-missing", "0.6 MPa"));
    assert_eq!(refused("breaker", "Isc: 40 kV").rule, "unit-mismatch");
    let unknown = refused("breaker", "rated voltage: 145 kW");
    assert_eq!(unknown.rule, "unit-mismatch");
    let typo = refused("breaker", "RRRV: 2 kV/uss");
    assert_eq!((typo.rule, repairs(&typo)), ("unknown-unit", vec!["kV/us"]));
    assert_eq!(refused("breaker", "kpp: 1.3 kV").rule, "unit-mismatch");
    let kind = refused("breaker", "BIL: 460 kV rms");
    assert_eq!((kind.rule, repairs(&kind)[0]), ("unit-kind", "651 kV peak"));
    assert_eq!(refused("breaker", "rated voltage: 1e400 kV").rule, "unreadable-value");
}

#[test]
fn labels_that_are_not_known_here() {
    let near = refused("breaker", "rated continous current: 2500 A");
    assert_eq!((near.rule, repairs(&near)[0]), ("unknown-label", "rated continuous current"));
    let other = refused("breaker", "altitude: 100 m");
    assert!(other.rule == "misplaced-label" && other.message.contains("site"), "{}", other.message);
    assert_eq!(repairs(&refused("breaker", "Us: 750 kV")).len(), 2);
    assert!(reading_findings(&assess("breaker", "\"colour of the cubicle\": \"light grey\"")).is_empty());
}

#[test]
fn from_duty_and_open_points() {
    assert_eq!(readings("breaker", "Ur: from duty"), [Reading::FromDuty]);
    assert_eq!(refused("breaker", "opening time: from duty").rule, "from-duty-misplaced");
    for open in ["later", "TBC", "as per IEC", "refer drawing", "?", "to be confirmed", "-"] {
        assert_eq!(readings("breaker", &format!("break time: {open}")), [Reading::Open(None)], "{open}");
    }
    let owned = readings("breaker", "break time: open point \"protection, until May\"");
    assert_eq!(owned, [Reading::Open(Some("protection, until May".to_owned()))]);
}

/// A second statement in brackets is read, whatever the pair of units.
#[test]
fn dual_statements() {
    for line in [
        "altitude: 328 ft (100 m)",
        "highest ambient: 40 degC (104 degF)",
        "ice: 20 mm (0.79 in)",
        "wind: 34 m/s (122 km/h)",
    ] {
        assert_eq!(quantity("site", line).again.len(), 1, "{line}");
        assert!(!assess("site", line).findings().iter().any(|f| f.rule == "dual-units-disagree"), "{line}");
    }
    let wrong = assess("site", "altitude: 328 ft (120 m)");
    assert!(wrong.findings().iter().any(|f| f.rule == "dual-units-disagree"));
}
