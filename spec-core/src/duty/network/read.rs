//! Infeeds read from the system outwards.

use super::{
    AtBusbar, BusbarKind, Infeeds, Lacking, Misplaced, Off, Part, Seen, at_system, nominal_of, number, same_level,
    shown,
};
use crate::particular::{Particular, SheetKind, infeed, system};
use crate::physics::infeed::{Impedance, Infeed, ZeroSequence};
use crate::quantity::{ElectricPotential, ElectricalResistance, Frequency, Physical, Ratio};
use crate::sheet::{Facts, Reading, Set, Sheet, SheetId};

/// A place where infeeds stand: at the system, or on the far side of an element.
#[derive(Clone, Copy, Debug)]
pub(super) struct At {
    /// The nominal voltage there, or the rated one of the transformer side that leads there.
    pub voltage: ElectricPotential,
    /// The nominal voltage, where it is known.
    pub nominal: Option<ElectricPotential>,
    /// The system's voltage over the voltage there, by the ratios of the transformers between.
    pub ratio: f64,
    /// The voltage factor of the system, where the place is at its voltage: a feeder stated there gives its own current back.
    pub c: Option<f64>,
    /// Whether it is the busbar of the system itself.
    pub busbar: bool,
    /// Whether zero-sequence current from there reaches the system: behind a delta winding nothing has to be known of it.
    pub earth: bool,
}

/// How many infeeds of one system are read: far more than a network has, and few enough for any text to be read at once.
const MOST_INFEEDS: usize = 300;

/// Reads the infeeds of one system.
pub(super) struct Reader<'a> {
    pub set: &'a Set,
    pub frequency: Option<Frequency>,
    pub found: Infeeds,
    /// Systems and infeeds that are being read, so that a circle ends.
    pub(super) open: Vec<SheetId>,
    /// All that were read.
    read: Vec<SheetId>,
    /// Whether the zero sequence of the one that is being read counts.
    pub(super) earth: bool,
}

/// A sheet with what it states.
#[derive(Clone, Copy)]
pub(super) struct Source<'a> {
    pub sheet: &'a Sheet,
    pub facts: &'a Facts,
}

impl Source<'_> {
    /// The value of a particular.
    pub fn quantity<Q: Physical>(&self, particular: &Particular) -> Option<Q> {
        self.facts.quantity::<Q>(particular).map(|stated| stated.value)
    }

    /// The value of a particular that has to be greater than zero.
    pub fn positive<Q: Physical>(&self, particular: &Particular) -> Option<Q> {
        self.quantity::<Q>(particular).filter(|value| value.si() > 0.0)
    }

    /// A number without a unit, or a share.
    pub fn number(&self, particular: &Particular) -> Option<f64> {
        self.quantity::<Ratio>(particular).map(|ratio| ratio.value)
    }

    /// Whether `none` stands for it.
    pub fn is_none(&self, particular: &Particular) -> bool {
        self.facts.all(particular).any(|s| s.reading == Reading::None)
    }
}

impl<'a> Reader<'a> {
    pub fn new(set: &'a Set, frequency: Option<Frequency>) -> Self {
        Self { set, frequency, found: Infeeds::default(), open: Vec::new(), read: Vec::new(), earth: true }
    }

    pub fn source(&self, id: SheetId) -> Option<Source<'a>> {
        self.set.sheet(id).map(|sheet| Source { sheet, facts: self.set.facts(id) })
    }

    /// Reads all infeeds of a system and combines them.
    pub fn read(&mut self, system: SheetId) {
        let ids: Vec<SheetId> = at_system(self.set, system).collect();
        let Some(own) = self.source(system).filter(|_| !ids.is_empty()) else { return };
        let Some((nominal, c)) = nominal_of(own.facts) else {
            self.lacks(&own, Off::Everything, &[&system::NOMINAL_VOLTAGE]);
            return;
        };
        if self.frequency.is_none() {
            self.lacks(&own, Off::Everything, &[&system::FREQUENCY]);
        }
        self.open.push(system);
        let at = At { voltage: nominal, nominal: Some(nominal), ratio: 1.0, c: Some(c), busbar: true, earth: true };
        let infeed = self.together(&ids, at);
        self.open.pop();
        self.found.lacking.extend(super::trv::almost_enough(&self.found.at_busbar));
        if let (Some(infeed), Some(frequency), false) = (infeed, self.frequency, self.found.incomplete) {
            self.found.seen = Some(Seen { infeed, nominal, c, frequency });
        }
    }

    /// That something gives less than it should.
    pub fn incomplete(&mut self) {
        self.found.incomplete = true;
    }

    /// Several infeeds at one place, side by side; elements that the same source feeds lead to it together.
    pub fn together(&mut self, ids: &[SheetId], at: At) -> Option<Infeed> {
        let mut seen: Vec<Infeed> = Vec::new();
        let mut done: Vec<SheetId> = Vec::new();
        for id in ids {
            if done.contains(id) {
                continue;
            }
            let group = self.fed_alike(*id, ids);
            seen.extend(if group.len() > 1 { self.side_by_side(&group, at) } else { self.one(*id, at) });
            done.extend(group);
        }
        Infeed::all_in_parallel(&seen)
    }

    /// What lacks of a sheet, as far as nothing is said of it; what is said and cannot be read is told by another rule.
    pub fn lacks(&mut self, source: &Source<'a>, off: Off, particulars: &[&Particular]) {
        let missing: Vec<String> =
            particulars.iter().filter(|p| !source.facts.mentions(p)).map(|p| p.label.to_owned()).collect();
        if !missing.is_empty() {
            self.lacks_words(source, off, missing);
        }
    }

    /// The same in words of its own.
    pub fn lacks_words(&mut self, source: &Source<'a>, off: Off, what: Vec<String>) {
        if off == Off::Earth && !self.earth {
            return;
        }
        let (title, place) = (source.sheet.title(), source.sheet.name_place);
        if let Some(known) = self.found.lacking.iter_mut().find(|l| l.place == place && l.off == off) {
            known.what.extend(what);
        } else {
            self.found.lacking.push(Lacking { title, place, what, off });
        }
    }

    /// That it stands at another voltage than its own.
    pub fn misplaced(&mut self, source: &Source<'a>, own: &[(ElectricPotential, &Particular)], at: At) {
        let stated = own.iter().find_map(|(_, particular)| source.facts.statement(particular));
        self.found.misplaced.push(Misplaced {
            title: source.sheet.title(),
            place: stated.map_or(source.sheet.name_place, |statement| statement.value),
            own: own.iter().map(|(voltage, _)| *voltage).collect(),
            there: at.voltage,
        });
    }

    /// Notes an infeed for the working: its own impedance, given at its place.
    pub fn part(&mut self, source: &Source<'a>, at: At, own: Impedance) {
        self.part_of(source, shown(own.scaled(at.ratio * at.ratio)));
    }

    pub fn part_of(&mut self, source: &Source<'a>, text: String) {
        let is_motor = source.facts.word(&infeed::KIND).is_some_and(|(kind, _)| kind == "motor group");
        let (name, place) = (source.sheet.name.clone(), source.sheet.name_place);
        self.found.parts.push(Part { name, place, text, is_motor });
    }

    /// The infeeds behind an element, as far as they are described.
    pub fn behind(&self, sheet: &Sheet) -> Vec<SheetId> {
        let through = self.set.pointing_at(sheet.id, "through").filter(|s| s.kind == SheetKind::Infeed).map(|s| s.id);
        through.chain(sheet.target("from")).collect()
    }

    /// What stands behind an element, combined; nothing where nothing does.
    pub fn combined_behind(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let behind = self.behind(source.sheet);
        if behind.is_empty() {
            let words = format!("what feeds it: from a system, or an infeed through {}", source.sheet.name);
            self.lacks_words(source, Off::Everything, vec![words]);
            return None;
        }
        self.together(&behind, at)
    }

    /// Whether an infeed may be read here: neither one too many, nor in a circle, nor by a second way, which only a mesh could tell.
    pub fn enters(&mut self, source: &Source<'a>) -> bool {
        let id = source.sheet.id;
        let why = if self.read.len() >= MOST_INFEEDS {
            if self.found.incomplete {
                return false;
            }
            format!("a place among the first {MOST_INFEEDS} infeeds; sum several up in one")
        } else if self.open.contains(&id) {
            "a source that is not fed by this system again".to_owned()
        } else if self.read.contains(&id) {
            "a single way by which it feeds in: a mesh is not reckoned, sum it up in one infeed".to_owned()
        } else {
            self.read.push(id);
            return true;
        };
        self.lacks_words(source, Off::Everything, vec![why]);
        self.found.incomplete = true;
        false
    }

    /// One infeed as its place sees it; a system stands for its network.
    pub fn one(&mut self, id: SheetId, at: At) -> Option<Infeed> {
        let source = self.source(id)?;
        if !self.enters(&source) {
            return None;
        }
        self.open.push(id);
        let earth = std::mem::replace(&mut self.earth, at.earth);
        let (seen, idle) = if source.sheet.kind == SheetKind::System {
            (self.whole_system(&source, at), false)
        } else if self.only_for_waves(&source, at) {
            (None, true)
        } else {
            (self.infeed(&source, at), false)
        };
        self.open.pop();
        self.earth = earth;
        self.found.incomplete |= seen.is_none() && !idle;
        seen
    }

    /// A line at the busbar that feeds nothing, and says so by having no impedance but that of a wave.
    fn only_for_waves(&mut self, source: &Source<'a>, at: At) -> bool {
        let Some((kind @ ("overhead line" | "cable"), _)) = source.facts.word(&infeed::KIND) else { return false };
        let conducts = [&infeed::RESISTANCE_PER_LENGTH, &infeed::REACTANCE_PER_LENGTH];
        let idle = at.busbar
            && self.behind(source.sheet).is_empty()
            && conducts.iter().all(|p| !source.facts.mentions(p))
            && source.facts.mentions(&infeed::SURGE_IMPEDANCE);
        if idle {
            self.note_busbar(source, kind, at);
        }
        idle
    }

    fn infeed(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let Some((kind, _)) = source.facts.word(&infeed::KIND) else {
            self.lacks(source, Off::Everything, &[&infeed::KIND]);
            return None;
        };
        self.note_busbar(source, kind, at);
        match kind {
            "network" => self.network(source, at),
            "transformer" => self.transformer(source, at),
            "overhead line" | "cable" | "series reactor" => self.led(source, kind, at),
            "generator" => self.generator(source, at),
            "power station unit" => self.power_station_unit(source, at),
            "motor group" => self.motors(source, at),
            "converter plant" => self.converter(source, at),
            _ if self.behind(source.sheet).is_empty() => self.impedance(source, at),
            _ => self.led(source, kind, at),
        }
    }

    /// The zero sequence of a source as it is stated: in ohm, by ratios, or that there is none.
    pub fn stated_zero(&mut self, source: &Source<'a>, positive: Impedance, scale: f64) -> ZeroSequence {
        let ohms = (
            source.quantity::<ElectricalResistance>(&infeed::ZERO_SEQUENCE_RESISTANCE),
            source.quantity::<ElectricalResistance>(&infeed::ZERO_SEQUENCE_REACTANCE),
        );
        if let (Some(r0), Some(x0)) = ohms {
            return ZeroSequence::Path(Impedance::new(r0, x0).scaled(scale));
        }
        let ratios = (source.number(&infeed::X0_OVER_X1), source.number(&infeed::R0_OVER_X0));
        if let (Some(x0), Some(r0)) = ratios {
            let reactance = positive.reactance() * x0;
            return ZeroSequence::Path(Impedance::new(reactance * r0, reactance));
        }
        let word = source.facts.word(&infeed::NEUTRAL).map(|(word, _)| word);
        if matches!(word, Some("isolated" | "resonant earthed")) {
            return ZeroSequence::Open;
        }
        let needed: [&Particular; 2] = if ratios.0.is_some() || ohms == (None, None) {
            [&infeed::X0_OVER_X1, &infeed::R0_OVER_X0]
        } else {
            [&infeed::ZERO_SEQUENCE_RESISTANCE, &infeed::ZERO_SEQUENCE_REACTANCE]
        };
        self.lacks(source, Off::Earth, &needed);
        ZeroSequence::Unknown
    }

    /// What the recovery voltage sees of an infeed directly at the busbar.
    pub fn note_busbar(&mut self, source: &Source<'a>, kind: &str, at: At) {
        if !at.busbar {
            return;
        }
        let kind = match kind {
            "overhead line" | "cable" => BusbarKind::Line {
                positive: source.positive(&infeed::SURGE_IMPEDANCE),
                zero: source.positive(&infeed::ZERO_SEQUENCE_SURGE_IMPEDANCE),
                length: source.positive(&infeed::LENGTH),
                open: self.behind(source.sheet).is_empty(),
            },
            "transformer" | "power station unit" | "generator" | "series reactor" => BusbarKind::Apparatus {
                machine: kind == "generator",
                power: source.positive(&infeed::RATED_POWER),
                reactance: None,
                natural: source.positive(&infeed::NATURAL_FREQUENCY),
                capacitance: source.positive(&infeed::CAPACITANCE_TO_EARTH),
            },
            _ => BusbarKind::Other,
        };
        let (name, place, number) = (source.sheet.name.clone(), source.sheet.name_place, number(source.facts));
        self.found.at_busbar.push(AtBusbar { name, place, number, kind });
    }

    /// Notes the reactance of an apparatus at the busbar, once it is known.
    pub fn note_reactance(&mut self, source: &Source<'a>, at: At, own: Impedance) {
        let place = source.sheet.name_place;
        if let Some(noted) = self.found.at_busbar.iter_mut().find(|noted| at.busbar && noted.place == place)
            && let BusbarKind::Apparatus { reactance, .. } = &mut noted.kind
        {
            *reactance = Some(own.reactance());
        }
    }

    /// Whether a voltage of its own is that of the place.
    pub fn stands_right(&mut self, source: &Source<'a>, particular: &Particular, at: At) -> bool {
        let Some(own) = source.positive::<ElectricPotential>(particular) else { return true };
        if same_level(own, at.voltage) {
            return true;
        }
        self.misplaced(source, &[(own, particular)], at);
        false
    }
}
