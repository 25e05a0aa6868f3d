//! What infeeds cost: `cargo bench -p firstpole-tests --bench infeeds`.

use std::fmt::Write as _;

use divan::{Bencher, black_box};
use firstpole_core::case::Case;
use firstpole_core::finding::Findings;
use firstpole_core::particular::SheetKind;
use firstpole_core::rules::{Check, Policy};
use firstpole_core::{Assessor, Sources};

fn main() {
    divan::main();
}

/// One breaker on a system of twelve infeeds (four networks behind lines, two transformers in parallel, a unit, motors), with
/// eight circuits.
fn text() -> String {
    let mut text =
        "cbspec 1\nsystem Ring\n    nominal voltage: 110 kV\n    highest voltage: 123 kV\n    frequency: 50 Hz\n    \
                    backup clearing time: 0.5 s\n    connection: overhead lines\n"
            .to_owned();
    for at in 1..=4 {
        let _ = write!(
            text,
            "infeed Net{at} into Ring through Line{at}\n    kind: network\n    nominal voltage: 110 kV\n    short-circuit current: 1{at} kA\n    \
             X/R: 9\n    X0/X1: 2.5\n    R0/X0: 0.2\ninfeed Line{at} into Ring\n    kind: overhead line\n    length: 1{at} km\n    \
             resistance per length: 0.12 ohm/km\n    reactance per length: 0.39 ohm/km\n    zero-sequence resistance per length: 0.32 ohm/km\n    \
             zero-sequence reactance per length: 1.26 ohm/km\n    surge impedance: 365 ohm\n    zero-sequence surge impedance: 610 ohm\n"
        );
    }
    text += "infeed Upper into Ring through Coupling\n    kind: network\n    fault level: 11 GVA at 220 kV\n    X/R: 14\n    X0/X1: 1.4\n    R0/X0: 0.1\n\
             infeed Coupling into Ring\n    kind: transformer\n    number in parallel: 2\n    rated power: 160 MVA\n    high-voltage side: 230 kV\n    \
             low-voltage side: 115 kV\n    impedance voltage: 12 %\n    load losses: 500 kW\n    winding connection: YNyn0\n    neutral: solidly earthed\n    \
             neutral of the far side: solidly earthed\n\
             infeed Unit into Ring\n    kind: power station unit\n    rated power: 125 MVA\n    rated voltage: 10.5 kV\n    subtransient reactance: 15 %\n    \
             armature resistance: 0.16 %\n    power factor: 0.85\n    high-voltage side: 121 kV\n    low-voltage side: 10.5 kV\n    impedance voltage: 12 %\n    \
             load losses: 410 kW\n    on-load tap range: none\n    winding connection: YNd5\n    neutral: solidly earthed\n\
             infeed Motors into Ring\n    kind: motor group\n    rated voltage: 110 kV\n    rated power: 20 MVA\n    starting current ratio: 5\n\
             site Yard\n    installation: outdoor\n    lowest ambient: -25 degC\n    highest ambient: 40 degC\n    altitude: 400 m\n    pollution: c medium\n\
             breaker Bay on Ring at Yard\n    rated voltage: 123 kV\n    rated frequency: 50 Hz\n    rated continuous current: 2500 A\n    \
             rated lightning impulse withstand voltage: 550 kV\n    rated short-duration power-frequency withstand voltage: 230 kV\n    \
             rated short-circuit breaking current: 40 kA\n    DC time constant: 60 ms\n    rated short-circuit making current: 108 kA\n    \
             rated short-time withstand current: 40 kA for 1 s\n    first-pole-to-clear factor: 1.3\n    opening time: 22 to 30 ms\n    classes: C2, M2\n";
    for at in 1..=8 {
        let _ = write!(
            text,
            "circuit C{at} for Bay\n    kind: overhead line\n    length: {at}0 km\n    capacitance per length: 9 nF/km\n    load current: 600 A\n"
        );
    }
    text
}

/// The whole assessment, reading included.
#[divan::bench]
fn assessment(bencher: Bencher) {
    let sources = Sources::of("infeeds.cbspec", text());
    let assessor = Assessor::standard();
    bencher.bench(|| assessor.assess(black_box(&sources)));
}

/// The case with its duty, and every rule on it and on the set: what follows once the text is read.
#[divan::bench]
fn all_rules(bencher: Bencher) {
    let assessor = Assessor::standard();
    let assessment = assessor.assess(&Sources::of("infeeds.cbspec", text()));
    let policy = Policy::default();
    bencher.bench(|| {
        let set = black_box(&assessment.set);
        let mut findings = Findings::new();
        for rule in assessor.rules() {
            if let Check::Set(check) | Check::Both(check, _) = rule.check {
                check(set, &policy, &mut findings);
            }
            if let Check::Sheet(check) | Check::Both(_, check) = rule.check {
                set.sheets().for_each(|sheet| check(set, sheet, &policy, &mut findings));
            }
        }
        for sheet in set.of_kind(SheetKind::Breaker) {
            let case = Case::new(set, sheet, &policy);
            for rule in assessor.rules() {
                if let Check::Case(check) = rule.check {
                    check(&case, &mut findings);
                }
            }
        }
        findings
    });
}
