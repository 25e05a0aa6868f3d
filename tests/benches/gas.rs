//! What the gas model costs: `cargo bench -p firstpole-tests --bench gas`.

#![allow(clippy::expect_used, reason = "a bench fails by panicking")]

use divan::{Bencher, black_box};
use firstpole_core::physics::gas::{GasMixture, pure};
use firstpole_core::quantity::{MassDensity, Physical, Pressure, ThermodynamicTemperature};
use firstpole_core::{Assessor, Sources};

fn main() {
    divan::main();
}

const REFERENCE: f64 = 293.15;

#[divan::bench]
fn pressure_of_density_and_temperature(bencher: Bencher) {
    let sf6 = pure("SF6").expect("a gas");
    let (density, t) = (MassDensity::from_si(38.0), ThermodynamicTemperature::from_si(280.0));
    bencher.bench(|| sf6.pressure(black_box(density), black_box(t)));
}

#[divan::bench]
fn pure_dew_point(bencher: Bencher) {
    let sf6 = pure("SF6").expect("a gas");
    let density = MassDensity::from_si(38.0);
    bencher.bench(|| sf6.dew_point(black_box(density)));
}

#[divan::bench]
fn dew_point_of_three_gases(bencher: Bencher) {
    let mixture = GasMixture::of(&[("C4F7N", 0.035), ("O2", 0.13), ("CO2", 0.835)]).expect("a mixture");
    let reference = ThermodynamicTemperature::from_si(REFERENCE);
    let volume = mixture.molar_volume(Pressure::from_si(0.8e6), reference).expect("a volume");
    bencher.bench(|| mixture.dew_point(black_box(volume)));
}

const BREAKER: &str = "cbspec 1\nsystem N\n    highest voltage: 145 kV\n    frequency: 50 Hz\nsite S\n    lowest ambient: -35 degC\n\
    breaker B on N at S\n    rated voltage: 145 kV\n    rated filling pressure: 0.80 MPa abs\n    alarm pressure: 0.74 MPa abs\n    \
    minimum functional pressure: 0.71 MPa abs\n";

/// A whole assessment of a small text, most of which is the gas of one breaker.
#[divan::bench(args = ["SF6", "SF6 60 % + N2 40 %", "C4F7N 3.5 % + O2 13 % + CO2 83.5 %"])]
fn assessment_of_a_breaker(bencher: Bencher, gas: &str) {
    let sources = Sources::of("gas.cbspec", format!("{BREAKER}    insulating gas: {gas}\n"));
    let assessor = Assessor::standard();
    bencher.bench(|| assessor.assess(black_box(&sources)));
}
