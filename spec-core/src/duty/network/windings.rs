//! How windings and neutrals are connected, as a vector group and words say.

use crate::particular::{Particular, infeed};
use crate::physics::infeed::{Impedance, Neutral, Winding};
use crate::quantity::ElectricalResistance;
use crate::sheet::Facts;

/// The letters of a winding connection such as `YNd5`, `Dyn11` or `YNyn0d5`: one for each winding, the high-voltage side first.
pub(super) fn letters(text: &str) -> Vec<Letter> {
    let mut all = Vec::new();
    let mut rest = text.chars().peekable();
    while let Some(letter) = rest.next() {
        let with_neutral = |rest: &mut std::iter::Peekable<std::str::Chars<'_>>| {
            rest.next_if(|next| next.eq_ignore_ascii_case(&'n')).is_some()
        };
        all.push(match letter.to_ascii_uppercase() {
            'Y' => Letter::Star(with_neutral(&mut rest)),
            'Z' => Letter::Zigzag(with_neutral(&mut rest)),
            'D' => Letter::Delta,
            digit if digit.is_ascii_digit() || digit == ' ' || digit == '-' => continue,
            // Auto-connected, a stabilising winding behind a plus, or a text of another kind.
            _ => return Vec::new(),
        });
    }
    all
}

/// One letter of a winding connection.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Letter {
    /// Star, and whether its neutral is brought out.
    Star(bool),
    /// Zigzag, likewise.
    Zigzag(bool),
    /// Delta.
    Delta,
}

impl Letter {
    /// The winding with its neutral; unknown where the neutral is brought out and nothing says what it is connected to.
    pub(super) fn winding(self, neutral: Option<Neutral>) -> Winding {
        match self {
            Self::Delta => Winding::Delta,
            Self::Star(false) => Winding::Star(Neutral::Isolated),
            Self::Zigzag(false) => Winding::Zigzag(Neutral::Isolated),
            Self::Star(true) => neutral.map_or(Winding::Unknown, Winding::Star),
            Self::Zigzag(true) => neutral.map_or(Winding::Unknown, Winding::Zigzag),
        }
    }
}

/// How the neutral is connected, by its word and its impedance; an error says what is missing, none where nothing is said of it.
pub(super) fn neutral(
    facts: &Facts,
    word: &Particular,
    impedance: Option<&Particular>,
) -> Result<Option<Neutral>, &'static str> {
    let stated = impedance.and_then(|p| facts.quantity::<ElectricalResistance>(p));
    let ohms = |reactive: bool| {
        stated.as_ref().map(|z| {
            let zero = ElectricalResistance::default();
            Neutral::Through(if reactive { Impedance::new(zero, z.value) } else { Impedance::new(z.value, zero) })
        })
    };
    let wording = stated.as_ref().map(|z| z.statement.wording.to_lowercase()).unwrap_or_default();
    let needed = infeed::NEUTRAL_IMPEDANCE.label;
    match facts.word(word).map(|(word, _)| word) {
        Some("isolated") => Ok(Some(Neutral::Isolated)),
        Some("low-resistance earthed" | "high-resistance earthed") => ohms(false).map(Some).ok_or(needed),
        Some("reactance earthed") => ohms(true).map(Some).ok_or(needed),
        // A coil in resonance with the capacitance of the network passes no fault current that counts.
        Some("resonant earthed") => Ok(Some(ohms(true).unwrap_or(Neutral::Isolated))),
        other => match other {
            _ if wording.contains("resistor") => Ok(ohms(false)),
            _ if wording.contains("reactor") => Ok(ohms(true)),
            _ if stated.is_some() => Err("neutral: low-resistance or reactance earthed"),
            Some("solidly earthed" | "effectively earthed") => Ok(Some(Neutral::Earthed)),
            Some(_) => Err(needed),
            None => Ok(None),
        },
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn vector_groups() {
        assert_eq!(letters("YNd5"), [Letter::Star(true), Letter::Delta]);
        assert_eq!(letters("Dyn11"), [Letter::Delta, Letter::Star(true)]);
        assert_eq!(letters("YNyn0d5"), [Letter::Star(true), Letter::Star(true), Letter::Delta]);
        assert_eq!(letters("Yzn5"), [Letter::Star(false), Letter::Zigzag(true)]);
        assert_eq!(letters("YNa0"), []);
        assert_eq!(letters("YNyn0+d"), []);
    }
}
