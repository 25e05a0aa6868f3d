//! Recovery voltage of generator circuit-breakers (IEC/IEEE 62271-37-013).

use std::sync::LazyLock;

use serde::Deserialize;

use super::table;
use crate::quantity::{ElectricPotential, Physical, Power, Time, VoltageRate};

/// Which side feeds the fault.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum GeneratorFault {
    /// The system, through the transformer.
    #[serde(rename = "system-source")]
    SystemSource,
    /// The generator.
    #[serde(rename = "generator-source")]
    GeneratorSource,
}

/// What a generator circuit-breaker withstands after a terminal fault.
#[derive(Clone, Debug, Deserialize)]
pub struct GeneratorBreakerTrv {
    fault: GeneratorFault,
    from_mva: f64,
    to_mva: f64,
    uc_over_ur: f64,
    rate_kv_per_us: f64,
    td_us: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

static ROWS: LazyLock<Vec<GeneratorBreakerTrv>> =
    LazyLock::new(|| table::rows(include_str!("../../data/generator_breaker_trv.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [GeneratorBreakerTrv] {
    &ROWS
}

impl GeneratorBreakerTrv {
    /// The peak at a rated voltage.
    pub fn peak(&self, rated: ElectricPotential) -> ElectricPotential {
        rated * self.uc_over_ur
    }

    /// The rate of rise.
    pub fn rate(&self) -> VoltageRate {
        VoltageRate::from_si(self.rate_kv_per_us * 1e9)
    }

    /// The time delay.
    pub fn delay(&self) -> Time {
        Time::from_si(self.td_us * 1e-6)
    }
}

/// The row of a fault and of the rated power of the transformer, or of the generator, that feeds it; a power at the border of two
/// rows belongs to the lower one. None for a power that is no positive number.
pub fn generator_breaker_trv(fault: GeneratorFault, power: Power) -> Option<&'static GeneratorBreakerTrv> {
    let mva = power.si() / 1e6;
    ROWS.iter().find(|row| row.fault == fault && mva > row.from_mva && mva <= row.to_mva)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rate(fault: GeneratorFault, mva: f64) -> Option<f64> {
        generator_breaker_trv(fault, Power::from_si(mva * 1e6)).map(|row| row.rate().si() / 1e9)
    }

    /// The greatest rates, 6.0 and 2.2 kV/us, are on the public opening page of a journal article; the rest is from memory.
    #[test]
    fn rows_by_power() {
        assert_eq!(rate(GeneratorFault::SystemSource, 1200.0), Some(6.0));
        assert_eq!(rate(GeneratorFault::GeneratorSource, 900.0), Some(2.2));
        assert_eq!(rate(GeneratorFault::SystemSource, 100.0), Some(3.5));
        assert_eq!(rate(GeneratorFault::SystemSource, 100.5), Some(4.0));
        assert_eq!(rate(GeneratorFault::SystemSource, 0.0), None);
        let row = generator_breaker_trv(GeneratorFault::SystemSource, Power::from_si(250e6)).expect("a row");
        assert!((row.peak(ElectricPotential::from_si(24e3)).si() - 44.16e3).abs() < 1.0);
        assert!((row.delay().si() - 1e-6).abs() < 1e-12);
    }
}
