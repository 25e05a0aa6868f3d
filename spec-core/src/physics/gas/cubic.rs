//! The Peng-Robinson equation of state for mixtures: p = RT/(v - b) - a/(v^2 + 2 b v - b^2) (Peng and Robinson 1976).

use super::constants::{Gas, interaction};
use super::pure::MOLAR_GAS_CONSTANT as R;

const OMEGA_A: f64 = 0.457_235_528_921_382_2;
const OMEGA_B: f64 = 0.077_796_073_903_888_46;

/// A mixture of a fixed set of gases; its composition is an argument.
#[derive(Clone, Debug)]
pub(super) struct Cubic {
    gases: Vec<&'static Gas>,
    kij: Vec<Vec<f64>>,
    /// Covolumes, m3/mol.
    b: Vec<f64>,
}

/// Attraction and covolume of a composition at one temperature.
#[derive(Clone, Debug)]
pub(super) struct Attraction {
    /// Pair attractions a_ij.
    pairs: Vec<Vec<f64>>,
    t: f64,
}

impl Cubic {
    /// The mixture of these gases, if the interaction of each pair is known.
    pub fn of(gases: &[&'static Gas]) -> Option<Self> {
        let kij = gases
            .iter()
            .map(|first| gases.iter().map(|second| interaction(first.formula, second.formula)).collect())
            .collect::<Option<Vec<Vec<f64>>>>()?;
        let b = gases
            .iter()
            .map(|gas| {
                let (tc, pc, _) = gas.cubic;
                OMEGA_B * R * tc / pc
            })
            .collect();
        Some(Self { gases: gases.to_vec(), kij, b })
    }

    /// The same gases without interaction.
    pub fn without_interaction(&self) -> Self {
        let none = self.kij.iter().map(|row| vec![0.0; row.len()]).collect();
        Self { kij: none, ..self.clone() }
    }

    /// The covolume of each gas.
    pub fn covolumes(&self) -> &[f64] {
        &self.b
    }

    /// The attractions at a temperature.
    pub fn attraction(&self, t: f64) -> Attraction {
        let own: Vec<f64> = self
            .gases
            .iter()
            .map(|gas| {
                let (tc, pc, omega) = gas.cubic;
                let m = 0.37464 + 1.54226 * omega - 0.26992 * omega * omega;
                let alpha = (1.0 + m * (1.0 - (t / tc).sqrt())).powi(2);
                OMEGA_A * R * R * tc * tc / pc * alpha
            })
            .collect();
        let pairs = self
            .kij
            .iter()
            .zip(&own)
            .map(|(row, first)| row.iter().zip(&own).map(|(k, second)| (first * second).sqrt() * (1.0 - k)).collect())
            .collect();
        Attraction { pairs, t }
    }

    /// The covolume of a composition.
    pub fn covolume(&self, x: &[f64]) -> f64 {
        self.b.iter().zip(x).map(|(b, x)| b * x).sum()
    }

    /// The pressure at a molar volume.
    pub fn pressure(&self, attraction: &Attraction, x: &[f64], v: f64) -> f64 {
        let b = self.covolume(x);
        R * attraction.t / (v - b) - attraction.of(x) / (v * v + 2.0 * b * v - b * b)
    }

    /// Compressibility factors at a pressure: of the liquid-like and of the gas-like root, equal where there is one.
    pub fn compressibility(&self, attraction: &Attraction, x: &[f64], p: f64) -> (f64, f64) {
        let rt = R * attraction.t;
        let (a, b) = (attraction.of(x) * p / (rt * rt), self.covolume(x) * p / rt);
        let roots = cubic_roots(b - 1.0, a - 3.0 * b * b - 2.0 * b, -(a * b - b * b - b * b * b));
        let above = roots.iter().copied().filter(|z| *z > b);
        let least = above.clone().fold(f64::INFINITY, f64::min);
        let greatest = above.fold(f64::NEG_INFINITY, f64::max);
        (least, greatest)
    }

    /// Logarithms of the fugacity coefficients of a composition with compressibility factor `z`.
    pub fn ln_fugacity(&self, attraction: &Attraction, x: &[f64], p: f64, z: f64) -> Vec<f64> {
        let rt = R * attraction.t;
        let (mix_a, mix_b) = (attraction.of(x), self.covolume(x));
        let (a, b) = (mix_a * p / (rt * rt), mix_b * p / rt);
        let root = std::f64::consts::SQRT_2;
        let log = ((z + (1.0 + root) * b) / (z + (1.0 - root) * b)).ln();
        let tail = a / (2.0 * root * b) * log;
        let ln_free = (z - b).ln();
        self.b
            .iter()
            .zip(&attraction.pairs)
            .map(|(bi, row)| {
                let sum: f64 = row.iter().zip(x).map(|(aij, xj)| aij * xj).sum();
                bi / mix_b * (z - 1.0) - ln_free - tail * (2.0 * sum / mix_a - bi / mix_b)
            })
            .collect()
    }

    /// A liquid that a vapour `y` at (T, p) would rather fall into: its composition, if there is one. Successive substitution from a
    /// liquid nearly pure in the gas of the highest critical temperature.
    pub fn incipient_liquid(&self, attraction: &Attraction, y: &[f64], p: f64, z: f64) -> Option<Vec<f64>> {
        let vapour = self.ln_fugacity(attraction, y, p, z);
        let heavy = self.heaviest(y)?;
        let rest = 0.05 / (y.len().max(2) - 1) as f64;
        let mut x: Vec<f64> = (0..y.len()).map(|at| if at == heavy { 0.95 } else { rest }).collect();
        let mut sum = 0.0;
        for _ in 0..500 {
            let (liquid_z, _) = self.compressibility(attraction, &x, p);
            let liquid = self.ln_fugacity(attraction, &x, p, liquid_z);
            let next: Vec<f64> = y
                .iter()
                .zip(&vapour)
                .zip(&liquid)
                .map(|((y, v), l)| if *y > 0.0 { y * (v - l).exp() } else { 0.0 })
                .collect();
            sum = next.iter().sum();
            let normal: Vec<f64> = next.iter().map(|n| n / sum).collect();
            let moved: f64 = normal.iter().zip(&x).map(|(a, b)| (a - b).abs()).sum();
            x = normal;
            if moved < 1e-11 {
                break;
            }
        }
        let apart: f64 = x.iter().zip(y).map(|(a, b)| (a - b).abs()).sum();
        (sum > 1.0 && apart > 1e-4).then_some(x)
    }

    /// The gas of the highest critical temperature that is there at all.
    fn heaviest(&self, y: &[f64]) -> Option<usize> {
        (0..self.gases.len()).filter(|at| y.get(*at).is_some_and(|y| *y > 0.0)).max_by(|a, b| {
            let tc = |at: &usize| self.gases.get(*at).map_or(0.0, |gas| gas.cubic.0);
            tc(a).total_cmp(&tc(b))
        })
    }
}

impl Attraction {
    /// The attraction of a composition.
    pub fn of(&self, x: &[f64]) -> f64 {
        self.pairs.iter().zip(x).map(|(row, xi)| xi * row.iter().zip(x).map(|(aij, xj)| aij * xj).sum::<f64>()).sum()
    }

    /// The temperature that it was made for, K.
    pub const fn temperature(&self) -> f64 {
        self.t
    }

    /// The attraction of one pair.
    pub fn pair(&self, first: usize, second: usize) -> f64 {
        self.pairs.get(first).and_then(|row| row.get(second)).copied().unwrap_or(f64::NAN)
    }
}

/// The real roots of z^3 + c2 z^2 + c1 z + c0, polished by Newton's method.
fn cubic_roots(c2: f64, c1: f64, c0: f64) -> Vec<f64> {
    let q = (c2 * c2 - 3.0 * c1) / 9.0;
    let r = (2.0 * c2 * c2 * c2 - 9.0 * c2 * c1 + 27.0 * c0) / 54.0;
    let polish = |z: f64| {
        let mut z = z;
        for _ in 0..3 {
            let f = ((z + c2) * z + c1) * z + c0;
            let slope = (3.0 * z + 2.0 * c2) * z + c1;
            if slope.abs() < 1e-300 {
                break;
            }
            z -= f / slope;
        }
        z
    };
    if r * r < q * q * q {
        let theta = (r / q.powf(1.5)).clamp(-1.0, 1.0).acos();
        let turn = std::f64::consts::TAU;
        (0..3).map(|n| polish(-2.0 * q.sqrt() * ((theta + turn * f64::from(n)) / 3.0).cos() - c2 / 3.0)).collect()
    } else {
        let s = -r.signum() * (r.abs() + (r * r - q * q * q).max(0.0).sqrt()).cbrt();
        let t = if s == 0.0 { 0.0 } else { q / s };
        vec![polish(s + t - c2 / 3.0)]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn roots_of_cubics() {
        let mut roots = cubic_roots(-6.0, 11.0, -6.0);
        roots.sort_by(f64::total_cmp);
        for (root, expected) in roots.iter().zip([1.0, 2.0, 3.0]) {
            assert!((root - expected).abs() < 1e-12);
        }
        let one = cubic_roots(0.0, 0.0, -8.0);
        assert!(one.len() == 1 && (one[0] - 2.0).abs() < 1e-12);
    }
}
