//! A second opinion on short-circuit currents: three invented networks, by a general-purpose network library (pandapower 3.5.6, the
//! script and its answers in `tests/reference/short_circuit`) and by ours. What we know of IEC 60909-0 is from memory; the library
//! was written by others.

#[allow(dead_code, reason = "the other tests of reference values use the rest")]
mod rows;

use firstpole_core::physics::infeed::{
    AsynchronousMotors, Fault, FeederStrength, FeederZero, Infeed, NetworkFeeder, Neutral, PassiveElement, PeakMethod,
    SynchronousGenerator, TwoWindingTransformer, Winding, ZeroSequence,
};
use firstpole_core::quantity::{
    ElectricPotential, ElectricalResistance, Frequency, ImpedancePerLength, Length, Physical, Power, Ratio, Time,
};
use rows::{Row, Tally, rows};

/// The voltage factor of the library from 1 kV up.
const C_MAX: f64 = 1.1;

/// Both sides compute the same formulas, and the file has six decimals of kA; found were 5e-8 at most.
const TOLERANCE: f64 = 1e-6;

fn kv(number: f64) -> ElectricPotential {
    ElectricPotential::from_si(number * 1e3)
}

fn mva(number: f64) -> Power {
    Power::from_si(number * 1e6)
}

fn per_km(number: f64) -> ImpedancePerLength {
    ImpedancePerLength::from_si(number * 1e-3)
}

fn feeder(nominal: f64, level: f64, zero: FeederZero) -> Infeed {
    let strength = FeederStrength::Level(mva(level));
    NetworkFeeder { nominal: kv(nominal), strength, c: C_MAX, r_over_x: 0.1, zero }.infeed()
}

/// The nominal voltage and what feeds a bus.
fn network(row: &Row) -> (f64, Infeed) {
    match (row.text("network"), row.text("bus")) {
        ("feeder_transformer_cable", bus) => {
            let transformer = TwoWindingTransformer {
                rated_power: mva(40.0),
                high: kv(110.0),
                low: kv(20.0),
                impedance_voltage: Ratio::from_si(0.12),
                load_losses: mva(0.2),
                zero: None,
                high_winding: Winding::Delta,
                low_winding: Winding::Star(Neutral::Earthed),
            };
            let zero = FeederZero::Ratios { x0_over_x1: 1.0, r0_over_x0: 0.1 };
            let low = feeder(110.0, 3000.0, zero).through(&transformer.downwards(C_MAX));
            let cable = PassiveElement {
                length: Length::from_si(3e3),
                resistance: per_km(0.125),
                reactance: per_km(0.11),
                zero: Some((per_km(0.5), per_km(0.33))),
            };
            (20.0, if bus == "low" { low } else { low.through(&cable.element()) })
        }
        ("generator", _) => {
            let generator = SynchronousGenerator {
                rated_voltage: kv(10.5),
                rated_power: mva(50.0),
                subtransient: Ratio::from_si(0.15),
                resistance: Some(ElectricalResistance::from_si(0.005)),
                power_factor: 0.85,
                voltage_range: Ratio::from_si(0.0),
                zero: ZeroSequence::Open,
            };
            (10.0, generator.infeed(kv(10.0), C_MAX))
        }
        ("feeder_and_motor", _) => {
            let motor = AsynchronousMotors {
                rated_voltage: kv(6.0),
                rated_power: mva(4.0),
                power_factor: 0.88,
                efficiency: Ratio::from_si(0.96),
                starting_ratio: 5.0,
                power_a_pole_pair: None,
                r_over_x: Some(0.1),
            };
            (6.0, feeder(6.0, 250.0, FeederZero::Unknown).parallel(&motor.infeed()))
        }
        other => panic!("{}: network {other:?}", row.place()),
    }
}

#[test]
fn currents_of_three_networks() {
    let mut tally = Tally::of("short_circuit/networks.csv");
    for row in rows(tally.file) {
        let (nominal, infeed) = network(&row);
        let fault = Fault::new(&infeed, kv(nominal), C_MAX, Frequency::from_si(50.0));
        let method = PeakMethod::EquivalentFrequency;
        let quantity = row.text("quantity");
        let found = match quantity {
            "ikss 3ph" => fault.three_phase(),
            "ikss 2ph" => fault.two_phase().expect("a current"),
            "ikss 1ph" => fault.single_phase().expect("a current"),
            "ip 3ph" => fault.peak(method),
            "ith 3ph" => fault.thermal(method, Time::from_si(1.0), 1.0).expect("a current"),
            other => panic!("{}: quantity {other}", row.place()),
        };
        let expected = row.number("ka");
        tally.near(&row, quantity, found.si() / 1e3, expected, TOLERANCE * expected, expected);
        tally.asserted += 1;
    }
    tally.end(16, 0);
}
