//! Elements between a source and the system: lines, cables, reactors, impedances and two-winding transformers.

use super::read::{At, Reader, Source};
use super::{Off, number, same_level};
use crate::particular::infeed;
use crate::physics::infeed::{Element, Impedance, Infeed, PassiveElement, ZeroAcross, ZeroSequence, series_reactor};
use crate::quantity::{ElectricCurrent, ElectricPotential, ElectricalResistance, ImpedancePerLength, Length, Ratio};
use crate::sheet::SheetId;

/// An element with the place behind it.
pub(super) struct Leading {
    /// What stands between.
    pub element: Element,
    /// The place behind it.
    pub beyond: At,
}

impl<'a> Reader<'a> {
    /// Which of `ids` lead to the very source that `id` leads to: itself, and other elements whose far side is the same.
    pub(super) fn fed_alike(&self, id: SheetId, ids: &[SheetId]) -> Vec<SheetId> {
        let Some(behind) = self.leads_to(id).filter(|behind| !behind.is_empty()) else { return vec![id] };
        ids.iter().copied().filter(|other| *other == id || self.leads_to(*other).as_ref() == Some(&behind)).collect()
    }

    /// What stands behind an element that leads one way; none of a source, or of a transformer with three windings.
    fn leads_to(&self, id: SheetId) -> Option<Vec<SheetId>> {
        let source = self.source(id)?;
        let (kind, _) = source.facts.word(&infeed::KIND)?;
        let leads = matches!(kind, "transformer" | "overhead line" | "cable" | "series reactor" | "impedance")
            && !source.facts.mentions(&infeed::MIDDLE_VOLTAGE_SIDE);
        leads.then(|| self.behind(source.sheet))
    }

    /// One element with what stands behind it.
    pub(super) fn led(&mut self, source: &Source<'a>, kind: &str, at: At) -> Option<Infeed> {
        let Some(leading) = self.leading(source, kind, at) else {
            // What stands behind is looked at all the same, so that everything missing is told at once.
            if kind == "transformer" {
                self.look_behind(source, at);
            } else {
                self.combined_behind(source, At { busbar: false, ..at });
            }
            return None;
        };
        let behind = self.combined_behind(source, leading.beyond)?;
        self.ask_zero(source, &leading.element, &behind);
        Some(behind.through(&leading.element))
    }

    /// Several elements that one source feeds, side by side: the source counts once.
    pub(super) fn side_by_side(&mut self, ids: &[SheetId], at: At) -> Option<Infeed> {
        let earth = std::mem::replace(&mut self.earth, at.earth);
        let depth = self.open.len();
        let sources: Vec<Source<'a>> = ids.iter().filter_map(|id| self.source(*id)).collect();
        let mut all: Vec<(Source<'a>, Leading)> = Vec::new();
        let mut complete = true;
        for source in sources {
            let Some((kind, _)) = source.facts.word(&infeed::KIND).filter(|_| self.enters(&source)) else {
                complete = false;
                continue;
            };
            self.open.push(source.sheet.id);
            self.note_busbar(&source, kind, at);
            match self.leading(&source, kind, at) {
                Some(leading) => all.push((source, leading)),
                None => complete = false,
            }
        }
        let seen = self.behind_all(&all);
        self.open.truncate(depth);
        self.earth = earth;
        if !complete || seen.is_none() {
            self.incomplete();
        }
        seen
    }

    fn behind_all(&mut self, all: &[(Source<'a>, Leading)]) -> Option<Infeed> {
        let (first, leading) = all.first()?;
        let there = leading.beyond;
        for (source, other) in all {
            if !same_level(other.beyond.voltage, there.voltage) {
                self.misplaced(source, &[(other.beyond.voltage, &infeed::HIGH_VOLTAGE_SIDE)], there);
                return None;
            }
        }
        let earth = all.iter().any(|(_, other)| other.beyond.earth);
        let behind = self.combined_behind(first, At { earth, ..there })?;
        for (source, other) in all {
            self.ask_zero(source, &other.element, &behind);
        }
        let elements: Vec<Element> = all.iter().map(|(_, other)| other.element).collect();
        behind.through_all(&elements)
    }

    /// The element that a sheet describes.
    fn leading(&mut self, source: &Source<'a>, kind: &str, at: At) -> Option<Leading> {
        let beyond = At { busbar: false, ..at };
        let element = match kind {
            "transformer" => return self.two_winding_element(source, at),
            "overhead line" | "cable" => self.line(source)?,
            "series reactor" => self.reactor(source, at)?,
            _ => {
                let (positive, zero) = self.plain(source, at)?;
                Element { positive, zero: ZeroAcross::Along(zero), ratio: 1.0 }
            }
        };
        self.part(source, at, element.positive);
        self.note_reactance(source, at, element.positive);
        Some(Leading { element, beyond })
    }

    /// Asks for the zero sequence of a line where any of its source's would pass.
    fn ask_zero(&mut self, source: &Source<'a>, element: &Element, behind: &Infeed) {
        if element.zero == ZeroAcross::Along(ZeroSequence::Unknown) && behind.zero() != ZeroSequence::Open {
            let needed = [&infeed::ZERO_SEQUENCE_RESISTANCE_PER_LENGTH, &infeed::ZERO_SEQUENCE_REACTANCE_PER_LENGTH];
            if source.facts.mentions(&infeed::REACTANCE_PER_LENGTH) {
                self.lacks(source, Off::Earth, &needed);
            }
        }
    }

    fn line(&mut self, source: &Source<'a>) -> Option<Element> {
        let needed = [&infeed::LENGTH, &infeed::RESISTANCE_PER_LENGTH, &infeed::REACTANCE_PER_LENGTH];
        let values = (
            source.positive::<Length>(&infeed::LENGTH),
            source.quantity::<ImpedancePerLength>(&infeed::RESISTANCE_PER_LENGTH),
            source.positive::<ImpedancePerLength>(&infeed::REACTANCE_PER_LENGTH),
        );
        let (Some(length), Some(resistance), Some(reactance)) = values else {
            self.lacks(source, Off::Everything, &needed);
            return None;
        };
        let zero = (
            source.quantity::<ImpedancePerLength>(&infeed::ZERO_SEQUENCE_RESISTANCE_PER_LENGTH),
            source.quantity::<ImpedancePerLength>(&infeed::ZERO_SEQUENCE_REACTANCE_PER_LENGTH),
        );
        let many = 1.0 / f64::from(number(source.facts));
        let zero = if let (Some(r0), Some(x0)) = zero { Some((r0 * many, x0 * many)) } else { None };
        let line = PassiveElement { length, resistance: resistance * many, reactance: reactance * many, zero };
        Some(line.element())
    }

    fn reactor(&mut self, source: &Source<'a>, at: At) -> Option<Element> {
        let reactance = source.positive::<ElectricalResistance>(&infeed::REACTANCE);
        let many = 1.0 / f64::from(number(source.facts));
        let rated = source.positive::<ElectricCurrent>(&infeed::RATED_CURRENT);
        let voltage = source.positive::<ElectricPotential>(&infeed::NOMINAL_VOLTAGE).or(at.nominal);
        let share = source.positive::<Ratio>(&infeed::IMPEDANCE_VOLTAGE);
        let of_share = || {
            let (share, rated, voltage) = (share?, rated?, voltage?);
            Some(series_reactor(share, voltage, rated).positive.reactance())
        };
        let Some(reactance) = reactance.or_else(of_share) else {
            if share.is_some() && rated.is_some() {
                self.lacks(source, Off::Everything, &[&infeed::NOMINAL_VOLTAGE]);
            } else if share.is_some() {
                self.lacks(source, Off::Everything, &[&infeed::RATED_CURRENT]);
            } else {
                self.lacks(source, Off::Everything, &[&infeed::REACTANCE]);
            }
            return None;
        };
        let resistance = source.quantity::<ElectricalResistance>(&infeed::RESISTANCE).unwrap_or_default();
        Some(Element::of_impedance(Impedance::new(resistance, reactance).scaled(many)))
    }

    /// A plain impedance as a source by itself.
    pub(super) fn impedance(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let (positive, zero) = self.plain(source, at)?;
        self.part(source, at, positive);
        Some(Infeed::of_impedance(positive, zero))
    }

    /// The impedances of a plain one; they are given at the system's voltage, wherever it stands.
    fn plain(&mut self, source: &Source<'a>, at: At) -> Option<(Impedance, ZeroSequence)> {
        let resistance = source.quantity::<ElectricalResistance>(&infeed::RESISTANCE);
        let reactance = source.positive::<ElectricalResistance>(&infeed::REACTANCE);
        let (Some(resistance), Some(reactance)) = (resistance, reactance) else {
            self.lacks(source, Off::Everything, &[&infeed::RESISTANCE, &infeed::REACTANCE]);
            return None;
        };
        let scale = 1.0 / (f64::from(number(source.facts)) * at.ratio * at.ratio);
        let positive = Impedance::new(resistance, reactance).scaled(scale);
        let zero = self.stated_zero(source, positive, scale);
        Some((positive, zero))
    }
}
