//! Complex impedances with their unit, and the sequence pair of one element.

use num_complex::Complex64;

use crate::quantity::{ElectricalResistance, Physical};

/// A complex impedance R + jX at the network's frequency, in ohm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Impedance(Complex64);

impl Impedance {
    /// R + jX.
    pub fn new(resistance: ElectricalResistance, reactance: ElectricalResistance) -> Self {
        Self(Complex64::new(resistance.si(), reactance.si()))
    }

    /// Of a magnitude, with the ratio of resistance to reactance; a ratio without end is a pure resistance.
    pub fn of_magnitude(magnitude: ElectricalResistance, r_over_x: f64) -> Self {
        if r_over_x.is_infinite() {
            return Self(Complex64::new(magnitude.si(), 0.0));
        }
        let reactance = magnitude.si() / (1.0 + r_over_x * r_over_x).sqrt();
        Self(Complex64::new(r_over_x * reactance, reactance))
    }

    /// Of a complex number of ohms.
    pub fn from_ohms(ohms: Complex64) -> Self {
        Self(ohms)
    }

    /// As a complex number of ohms.
    pub fn ohms(self) -> Complex64 {
        self.0
    }

    /// R.
    pub fn resistance(self) -> ElectricalResistance {
        ElectricalResistance::from_si(self.0.re)
    }

    /// X.
    pub fn reactance(self) -> ElectricalResistance {
        ElectricalResistance::from_si(self.0.im)
    }

    /// |Z|.
    pub fn magnitude(self) -> ElectricalResistance {
        ElectricalResistance::from_si(self.0.norm())
    }

    /// R/X.
    pub fn r_over_x(self) -> f64 {
        self.0.re / self.0.im
    }

    /// Two in parallel; two that cancel give an impedance without end.
    #[must_use]
    pub fn parallel(self, other: Self) -> Self {
        // Written without reciprocals, so that a short circuit in one branch stays one.
        if self.0.norm() == 0.0 || other.0.norm() == 0.0 {
            return Self(Complex64::new(0.0, 0.0));
        }
        Self(self.0 * other.0 / (self.0 + other.0))
    }

    /// Multiplied by a real factor: a correction factor, or the square of a ratio of voltages.
    #[must_use]
    pub fn scaled(self, factor: f64) -> Self {
        Self(self.0 * factor)
    }

    /// With the reactance that it has at a share of the frequency.
    #[must_use]
    pub fn at_share_of_frequency(self, share: f64) -> Self {
        Self(Complex64::new(self.0.re, self.0.im * share))
    }
}

impl std::ops::Add for Impedance {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        Self(self.0 + other.0)
    }
}

/// The zero-sequence impedance between a point and earth, or along an element.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ZeroSequence {
    /// Not stated: nothing that rests on it can be told.
    Unknown,
    /// No zero-sequence current passes.
    Open,
    /// It passes through this impedance.
    Path(Impedance),
}

impl ZeroSequence {
    /// The impedance, where there is one.
    pub fn path(self) -> Option<Impedance> {
        match self {
            Self::Path(impedance) => Some(impedance),
            Self::Unknown | Self::Open => None,
        }
    }

    /// One after the other.
    #[must_use]
    pub fn series(self, other: Self) -> Self {
        match (self, other) {
            // An open element passes nothing, whatever lies behind it.
            (Self::Open, _) | (_, Self::Open) => Self::Open,
            (Self::Path(a), Self::Path(b)) => Self::Path(a + b),
            _ => Self::Unknown,
        }
    }

    /// Side by side.
    #[must_use]
    pub fn parallel(self, other: Self) -> Self {
        match (self, other) {
            (Self::Unknown, _) | (_, Self::Unknown) => Self::Unknown,
            (Self::Open, z) | (z, Self::Open) => z,
            (Self::Path(a), Self::Path(b)) => Self::Path(a.parallel(b)),
        }
    }

    /// Multiplied by a real factor.
    #[must_use]
    pub fn scaled(self, factor: f64) -> Self {
        match self {
            Self::Path(impedance) => Self::Path(impedance.scaled(factor)),
            other => other,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn z(r: f64, x: f64) -> Impedance {
        Impedance::new(ElectricalResistance::from_si(r), ElectricalResistance::from_si(x))
    }

    /// Own calculation.
    #[test]
    fn series_and_parallel() {
        let sum = z(1.0, 2.0) + z(3.0, 4.0);
        assert_eq!(sum, z(4.0, 6.0));
        let half = z(1.0, 2.0).parallel(z(1.0, 2.0));
        assert!((half.ohms() - z(0.5, 1.0).ohms()).norm() < 1e-12);
        assert_eq!(z(0.0, 0.0).parallel(z(1.0, 1.0)), z(0.0, 0.0));
        let of = Impedance::of_magnitude(ElectricalResistance::from_si(2.0), 0.1);
        assert!((of.magnitude().si() - 2.0).abs() < 1e-12 && (of.r_over_x() - 0.1).abs() < 1e-12);
    }

    #[test]
    fn an_open_path_hides_what_is_behind_it_and_an_unknown_one_beside_it_counts() {
        let path = ZeroSequence::Path(z(0.0, 1.0));
        assert_eq!(ZeroSequence::Open.series(ZeroSequence::Unknown), ZeroSequence::Open);
        assert_eq!(path.series(ZeroSequence::Unknown), ZeroSequence::Unknown);
        assert_eq!(path.parallel(ZeroSequence::Unknown), ZeroSequence::Unknown);
        assert_eq!(path.parallel(ZeroSequence::Open), path);
    }
}
