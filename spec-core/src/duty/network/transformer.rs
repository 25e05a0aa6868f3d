//! Transformers, and the units of a power station.

use super::element::Leading;
use super::read::{At, Reader, Source};
use super::windings::{Letter, letters, neutral};
use super::{Off, number, same_level};
use crate::particular::{Particular, infeed};
use crate::physics::infeed::{
    Infeed, Neutral, PairOfWindings, PowerStationUnit, TapChanger, ThreeWindingTransformer, TwoWindingTransformer,
    Winding,
};
use crate::quantity::{ElectricPotential, Physical, Power, Ratio};
use crate::sheet::SheetId;

/// The side of a transformer that its place is at.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Side {
    High,
    Low,
}

impl<'a> Reader<'a> {
    /// The particulars of windings: connection of each side, with the neutral of the side at the place and of the others. What is
    /// missing of it puts out faults to earth only.
    fn windings(&mut self, source: &Source<'a>, own: usize, sides: usize) -> Vec<Winding> {
        let unknown = vec![Winding::Unknown; sides];
        let Some((text, _)) = source.facts.text(&infeed::WINDING_CONNECTION) else {
            self.lacks(source, Off::Earth, &[&infeed::WINDING_CONNECTION]);
            return unknown;
        };
        let letters = letters(text);
        if letters.len() != sides {
            let words = format!("{} with a letter for each of {sides} windings", infeed::WINDING_CONNECTION.label);
            self.lacks_words(source, Off::Earth, vec![words]);
            return unknown;
        }
        // What no zero-sequence current enters from this side hides the other sides.
        let enters = letters.get(own).is_some_and(|l| matches!(l, Letter::Star(true) | Letter::Zigzag(true)));
        let mut all = Vec::new();
        for (at, letter) in letters.iter().enumerate() {
            let brought_out = matches!(letter, Letter::Star(true) | Letter::Zigzag(true));
            let (word, impedance): (&Particular, Option<&Particular>) = if at == own {
                (&infeed::NEUTRAL, Some(&infeed::NEUTRAL_IMPEDANCE))
            } else {
                (&infeed::FAR_SIDE_NEUTRAL, None)
            };
            let found = if brought_out && enters { neutral(source.facts, word, impedance) } else { Ok(None) };
            let winding = match found {
                Ok(found) => {
                    if found.is_none() && brought_out && enters {
                        self.lacks(source, Off::Earth, &[word]);
                    }
                    letter.winding(found)
                }
                Err(needed) => {
                    self.lacks_words(source, Off::Earth, vec![needed.to_owned()]);
                    Winding::Unknown
                }
            };
            all.push(winding);
        }
        all
    }

    /// The side of a transformer at a place; told where it has none there.
    fn side(&mut self, source: &Source<'a>, high: ElectricPotential, low: ElectricPotential, at: At) -> Option<Side> {
        let apart = |own: ElectricPotential| (own / at.voltage).value.ln().abs();
        let side = if apart(high) <= apart(low) { Side::High } else { Side::Low };
        let own = if side == Side::High { high } else { low };
        if same_level(own, at.voltage) {
            return Some(side);
        }
        self.misplaced(source, &[(high, &infeed::HIGH_VOLTAGE_SIDE), (low, &infeed::LOW_VOLTAGE_SIDE)], at);
        None
    }

    /// A two-winding transformer as its sheet gives it, of all that stand side by side.
    fn two_windings(&mut self, source: &Source<'a>, power: Option<Power>, many: f64) -> Option<TwoWindingTransformer> {
        let values = (
            power,
            source.positive::<ElectricPotential>(&infeed::HIGH_VOLTAGE_SIDE),
            source.positive::<ElectricPotential>(&infeed::LOW_VOLTAGE_SIDE),
            source.positive::<Ratio>(&infeed::IMPEDANCE_VOLTAGE),
            source.quantity::<Power>(&infeed::LOAD_LOSSES).filter(|losses| losses.si() >= 0.0),
        );
        let (Some(power), Some(high), Some(low), Some(impedance_voltage), Some(losses)) = values else {
            let needed: [&Particular; 5] = [
                &infeed::RATED_POWER,
                &infeed::HIGH_VOLTAGE_SIDE,
                &infeed::LOW_VOLTAGE_SIDE,
                &infeed::IMPEDANCE_VOLTAGE,
                &infeed::LOAD_LOSSES,
            ];
            self.lacks(source, Off::Everything, &needed);
            return None;
        };
        Some(TwoWindingTransformer {
            rated_power: power * many,
            high,
            low,
            impedance_voltage,
            load_losses: losses * many,
            zero: source.positive::<Ratio>(&infeed::ZERO_SEQUENCE_IMPEDANCE_VOLTAGE),
            high_winding: Winding::Unknown,
            low_winding: Winding::Unknown,
        })
    }

    pub(super) fn transformer(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        if source.facts.mentions(&infeed::MIDDLE_VOLTAGE_SIDE) {
            return self.three_windings(source, at);
        }
        // A generator alone behind it makes it the transformer of a unit.
        let generator = match self.behind(source.sheet).as_slice() {
            [only] => self.source(*only).filter(|behind| is_kind(behind, "generator")),
            _ => None,
        };
        let Some(generator) = generator else { return self.led(source, "transformer", at) };
        let (transformer, side, _) = self.placed(source, at)?;
        if side == Side::Low {
            return self.led(source, "transformer", at);
        }
        if !self.enters(&generator) {
            return None;
        }
        self.unit(source, &generator, transformer, at)
    }

    /// A two-winding transformer with the side that it turns to its place, and the place behind it.
    fn placed(&mut self, source: &Source<'a>, at: At) -> Option<(TwoWindingTransformer, Side, At)> {
        let many = f64::from(number(source.facts));
        let power = source.positive::<Power>(&infeed::RATED_POWER);
        let mut transformer = self.two_windings(source, power, many)?;
        let side = self.side(source, transformer.high, transformer.low, at)?;
        let (own, far) = match side {
            Side::High => (transformer.high, transformer.low),
            Side::Low => (transformer.low, transformer.high),
        };
        let windings = self.windings(source, usize::from(side == Side::Low), 2);
        if let [high, low] = windings.as_slice() {
            transformer.high_winding = shared(*high, many);
            transformer.low_winding = shared(*low, many);
        }
        let behind = self.behind(source.sheet);
        let beyond = At {
            voltage: far,
            nominal: self.nominal_of_any(&behind),
            ratio: at.ratio * (own / far).value,
            c: None,
            busbar: false,
            earth: at.earth && both_earthed(transformer.high_winding, transformer.low_winding),
        };
        Some((transformer, side, beyond))
    }

    /// The same as an element between its place and what stands behind it.
    pub(super) fn two_winding_element(&mut self, source: &Source<'a>, at: At) -> Option<Leading> {
        let (transformer, side, beyond) = self.placed(source, at)?;
        // cmax of the network at the low-voltage side; at the system's voltage its own factor.
        let element = match side {
            Side::High => transformer.upwards(super::c_max(beyond.nominal.unwrap_or(transformer.low))),
            Side::Low => transformer.downwards(at.c.unwrap_or_else(|| super::c_max(transformer.low))),
        };
        self.part(source, at, element.positive);
        self.note_reactance(source, at, element.positive);
        Some(Leading { element, beyond })
    }

    /// Looks at what stands behind a transformer that itself says too little, so that everything missing is told at once.
    pub(super) fn look_behind(&mut self, source: &Source<'a>, at: At) {
        let high = source.positive::<ElectricPotential>(&infeed::HIGH_VOLTAGE_SIDE);
        let low = source.positive::<ElectricPotential>(&infeed::LOW_VOLTAGE_SIDE);
        let (Some(high), Some(low)) = (high, low) else { return };
        let Some(side) = self.side(source, high, low, at) else { return };
        let (own, far) = if side == Side::High { (high, low) } else { (low, high) };
        let nominal = self.nominal_of_any(&self.behind(source.sheet));
        self.combined_behind(
            source,
            At { voltage: far, nominal, ratio: at.ratio * (own / far).value, c: None, busbar: false, earth: false },
        );
    }

    /// The nominal voltage that any of these states.
    fn nominal_of_any(&self, ids: &[SheetId]) -> Option<ElectricPotential> {
        ids.iter().find_map(|id| {
            let source = self.source(*id)?;
            source
                .positive::<ElectricPotential>(&infeed::NOMINAL_VOLTAGE)
                .or_else(|| source.positive(&crate::particular::system::NOMINAL_VOLTAGE))
        })
    }

    /// A generator alone behind its transformer: a unit of a power station, corrected as one.
    fn unit(
        &mut self,
        source: &Source<'a>,
        generator: &Source<'a>,
        transformer: TwoWindingTransformer,
        at: At,
    ) -> Option<Infeed> {
        let machine = self.generator_of(generator, true);
        let tap_changer = self.tap_changer(source);
        let (mut machine, tap_changer) = (machine?, tap_changer?);
        let there = At { voltage: transformer.low, nominal: None, ratio: 1.0, c: None, busbar: false, earth: false };
        if !self.stands_right(generator, &infeed::RATED_VOLTAGE, there) {
            return None;
        }
        // Equal ones side by side make one of their power.
        let many = f64::from(number(generator.facts));
        machine.rated_power *= many;
        machine.resistance = machine.resistance.map(|r| r / many);
        let infeed = self.as_unit(source, PowerStationUnit { generator: machine, transformer, tap_changer }, at)?;
        self.part_of(generator, format!("corrected with {}", source.sheet.name));
        Some(infeed)
    }

    fn as_unit(&mut self, source: &Source<'a>, unit: PowerStationUnit, at: At) -> Option<Infeed> {
        let nominal = source.positive::<ElectricPotential>(&infeed::NOMINAL_VOLTAGE).or(at.nominal);
        let Some(nominal) = nominal else {
            self.lacks(source, Off::Everything, &[&infeed::NOMINAL_VOLTAGE]);
            return None;
        };
        let infeed = unit.infeed(nominal, at.c.unwrap_or_else(|| super::c_max(nominal)));
        self.part(source, at, infeed.positive()?);
        self.note_reactance(source, at, infeed.positive()?);
        Some(infeed)
    }

    /// With on-load tap changer, or without.
    fn tap_changer(&mut self, source: &Source<'a>) -> Option<TapChanger> {
        let range = source.quantity::<Ratio>(&infeed::ON_LOAD_TAP_RANGE);
        if range.is_some_and(|range| range.si() > 0.0) {
            return Some(TapChanger::OnLoad);
        }
        if range.is_some() || source.is_none(&infeed::ON_LOAD_TAP_RANGE) {
            return Some(TapChanger::OffLoad(source.quantity(&infeed::OFF_LOAD_TAP).unwrap_or_default()));
        }
        if !source.facts.mentions(&infeed::ON_LOAD_TAP_RANGE) {
            let words = format!("{} (a share, or none)", infeed::ON_LOAD_TAP_RANGE.label);
            self.lacks_words(source, Off::Everything, vec![words]);
        }
        None
    }

    pub(super) fn power_station_unit(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let power = source
            .positive::<Power>(&infeed::UNIT_TRANSFORMER_POWER)
            .or_else(|| source.positive::<Power>(&infeed::RATED_POWER));
        let generator = self.generator_of(source, true);
        let transformer = self.two_windings(source, power, 1.0);
        let tap_changer = self.tap_changer(source);
        let (generator, mut transformer, tap_changer) = (generator?, transformer?, tap_changer?);
        if self.side(source, transformer.high, transformer.low, at)? == Side::Low {
            self.misplaced(source, &[(transformer.high, &infeed::HIGH_VOLTAGE_SIDE)], at);
            return None;
        }
        if let [high, low] = self.windings(source, 0, 2).as_slice() {
            (transformer.high_winding, transformer.low_winding) = (*high, *low);
        }
        let many = number(source.facts);
        let before = self.found.parts.len();
        let infeed = self.as_unit(source, PowerStationUnit { generator, transformer, tap_changer }, at)?;
        if many > 1 {
            let all = infeed.times(many);
            self.found.parts.truncate(before);
            self.part(source, at, all.positive()?);
            self.note_reactance(source, at, all.positive()?);
            return Some(all);
        }
        Some(infeed)
    }

    fn pair(
        &mut self,
        source: &Source<'a>,
        [power, impedance_voltage, losses]: [&'static Particular; 3],
        many: f64,
    ) -> Option<PairOfWindings> {
        let base = source.positive::<Power>(power).or_else(|| source.positive(&infeed::RATED_POWER));
        let values = (
            base,
            source.positive::<Ratio>(impedance_voltage),
            source.quantity::<Power>(losses).filter(|losses| losses.si() >= 0.0),
        );
        let (Some(power), Some(impedance_voltage), Some(losses)) = values else {
            if base.is_none() {
                self.lacks(source, Off::Everything, &[&infeed::RATED_POWER]);
            }
            let mut needed = vec![impedance_voltage, losses];
            needed.retain(|p| !source.facts.mentions(p));
            if !needed.is_empty() {
                self.lacks(source, Off::Everything, &needed);
            }
            return None;
        };
        Some(PairOfWindings { power: power * many, impedance_voltage, load_losses: losses * many })
    }

    fn three_windings(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let sides: [&'static Particular; 3] =
            [&infeed::HIGH_VOLTAGE_SIDE, &infeed::MIDDLE_VOLTAGE_SIDE, &infeed::LOW_VOLTAGE_SIDE];
        let many = f64::from(number(source.facts));
        let voltages = sides.map(|side| source.positive::<ElectricPotential>(side));
        let pairs = [
            [&infeed::RATED_POWER, &infeed::IMPEDANCE_VOLTAGE, &infeed::LOAD_LOSSES],
            [
                &infeed::RATED_POWER_HIGH_TO_LOW,
                &infeed::IMPEDANCE_VOLTAGE_HIGH_TO_LOW,
                &infeed::LOAD_LOSSES_HIGH_TO_LOW,
            ],
            [
                &infeed::RATED_POWER_MIDDLE_TO_LOW,
                &infeed::IMPEDANCE_VOLTAGE_MIDDLE_TO_LOW,
                &infeed::LOAD_LOSSES_MIDDLE_TO_LOW,
            ],
        ]
        .map(|particulars| self.pair(source, particulars, many));
        let [Some(high), Some(middle), Some(low)] = voltages else {
            self.lacks(source, Off::Everything, &sides);
            return None;
        };
        let [Some(hm), Some(hl), Some(ml)] = pairs else { return None };
        let voltages = [high, middle, low];
        let own = nearest(&voltages, at.voltage, None);
        let Some((own, own_voltage)) = own else {
            let stated: Vec<(ElectricPotential, &Particular)> = voltages.into_iter().zip(sides).collect();
            self.misplaced(source, &stated, at);
            return None;
        };
        let windings = match self.windings(source, own, 3).as_slice() {
            [a, b, c] => [*a, *b, *c].map(|winding| shared(winding, many)),
            _ => [Winding::Unknown; 3],
        };
        let of_zero = |pair: PairOfWindings, particular| {
            Some(PairOfWindings { impedance_voltage: source.positive::<Ratio>(particular)?, ..pair })
        };
        let zero = [
            of_zero(hm, &infeed::ZERO_SEQUENCE_IMPEDANCE_VOLTAGE),
            of_zero(hl, &infeed::ZERO_SEQUENCE_IMPEDANCE_VOLTAGE_HIGH_TO_LOW),
            of_zero(ml, &infeed::ZERO_SEQUENCE_IMPEDANCE_VOLTAGE_MIDDLE_TO_LOW),
        ];
        let zero = if let [Some(a), Some(b), Some(c)] = zero { Some([a, b, c]) } else { None };
        let transformer = ThreeWindingTransformer { voltages, windings, pairs: [hm, hl, ml], zero };
        let behind = self.behind_sides(source, &transformer, (own, own_voltage), at)?;
        let c = super::c_max(low);
        let [high, middle, low] = &behind;
        let seen = match own {
            0 => transformer.seen_from_high(middle.as_ref(), low.as_ref(), c),
            1 => transformer.seen_from_middle(high.as_ref(), low.as_ref(), c),
            _ => transformer.seen_from_low(high.as_ref(), middle.as_ref(), c),
        };
        let bare = transformer.star(own_voltage, c);
        // From the own side to the one that feeds it.
        let fed = behind.iter().position(Option::is_some)?;
        let along = bare.get(own).zip(bare.get(fed)).map(|(a, b)| *a + *b)?;
        self.part(source, at, along);
        self.note_reactance(source, at, along);
        Some(seen)
    }

    /// What feeds each of the other sides, by the voltages of the sources.
    fn behind_sides(
        &mut self,
        source: &Source<'a>,
        transformer: &ThreeWindingTransformer,
        (own, own_voltage): (usize, ElectricPotential),
        at: At,
    ) -> Option<[Option<Infeed>; 3]> {
        let voltages = &transformer.voltages;
        let own_winding = transformer.windings.get(own).copied().unwrap_or(Winding::Unknown);
        let behind = self.behind(source.sheet);
        if behind.is_empty() {
            return self.combined_behind(source, at).map(|_| [None, None, None]);
        }
        let mut at_sides: [Vec<SheetId>; 3] = Default::default();
        for id in behind {
            let Some(feeding) = self.source(id) else { continue };
            let found = voltages_of(&feeding).iter().find_map(|voltage| nearest(voltages, *voltage, Some(own)));
            let Some(list) = found.and_then(|(side, _)| at_sides.get_mut(side)) else {
                self.lacks(&feeding, Off::Everything, &[&infeed::NOMINAL_VOLTAGE]);
                self.incomplete();
                return None;
            };
            list.push(id);
        }
        let mut seen: [Option<Infeed>; 3] = [None, None, None];
        for (((ids, voltage), winding), slot) in at_sides.iter().zip(voltages).zip(transformer.windings).zip(&mut seen)
        {
            if !ids.is_empty() {
                let nominal = self.nominal_of_any(ids);
                let ratio = at.ratio * (own_voltage / *voltage).value;
                let earth = at.earth && both_earthed(own_winding, winding);
                let there = At { voltage: *voltage, nominal, ratio, c: None, busbar: false, earth };
                *slot = self.together(ids, there);
            }
        }
        Some(seen)
    }
}

/// Whether two windings pass zero-sequence current from one to the other: both in star, with an earthed neutral.
fn both_earthed(one: Winding, other: Winding) -> bool {
    // Of an unknown winding the connection is asked for first.
    let earthed = |winding| matches!(winding, Winding::Star(neutral) if neutral != Neutral::Isolated);
    earthed(one) && earthed(other)
}

/// The neutral of several transformers side by side: each has its own.
fn shared(winding: Winding, many: f64) -> Winding {
    let of = |neutral: Neutral| match neutral {
        Neutral::Through(impedance) => Neutral::Through(impedance.scaled(1.0 / many)),
        other => other,
    };
    match winding {
        Winding::Star(neutral) => Winding::Star(of(neutral)),
        Winding::Zigzag(neutral) => Winding::Zigzag(of(neutral)),
        other => other,
    }
}

/// The side, other than `but`, whose voltage is of the same level and nearest.
fn nearest(
    voltages: &[ElectricPotential; 3],
    wanted: ElectricPotential,
    but: Option<usize>,
) -> Option<(usize, ElectricPotential)> {
    let apart = |own: ElectricPotential| (own / wanted).value.ln().abs();
    voltages
        .iter()
        .copied()
        .enumerate()
        .filter(|(side, own)| but != Some(*side) && same_level(*own, wanted))
        .min_by(|a, b| apart(a.1).total_cmp(&apart(b.1)))
}

/// The voltages that a sheet states, by which it finds its side of a transformer.
fn voltages_of(source: &Source<'_>) -> Vec<ElectricPotential> {
    let particulars: [&Particular; 6] = [
        &infeed::NOMINAL_VOLTAGE,
        &infeed::RATED_VOLTAGE,
        &crate::particular::system::NOMINAL_VOLTAGE,
        &infeed::HIGH_VOLTAGE_SIDE,
        &infeed::MIDDLE_VOLTAGE_SIDE,
        &infeed::LOW_VOLTAGE_SIDE,
    ];
    particulars.into_iter().filter_map(|particular| source.positive(particular)).collect()
}

fn is_kind(source: &Source<'_>, kind: &str) -> bool {
    source.facts.word(&infeed::KIND).is_some_and(|(word, _)| word == kind)
}
