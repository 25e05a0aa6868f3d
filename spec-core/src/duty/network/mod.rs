//! The infeeds of a system: what they say, what they lack, and what the connection point sees of them.
//!
//! An infeed stands at the system, or behind another one (`through` it, or `from` it). Those at one place are in parallel. They are
//! read from the system outwards, so that every transformer knows which of its sides is the system's.

mod currents;
mod element;
mod read;
mod source;
mod transformer;
mod trv;
mod windings;

pub use currents::FromInfeeds;
pub use trv::NetworkTrv;
pub(crate) use trv::{limited, withstand};

use crate::particular::{SheetKind, infeed, system};
use crate::physics::infeed::{Impedance, Infeed};
use crate::quantity::{
    Capacitance, ElectricPotential, ElectricalResistance, Frequency, Length, Physical, Power, Ratio, significant,
};
use crate::sheet::{Facts, Set, SheetId};
use crate::source::Place;
use crate::standards;

/// The infeeds of a system.
#[derive(Clone, Debug, Default)]
pub struct Infeeds {
    /// What the connection point sees; none where there are no infeeds, or one of them lacks what is needed.
    pub seen: Option<Seen>,
    /// Each of them, from the system outwards.
    pub parts: Vec<Part>,
    /// What has to be written, infeed by infeed.
    pub lacking: Vec<Lacking>,
    /// Whether an infeed gave nothing, for whatever reason: then the others together are too little.
    pub incomplete: bool,
    /// Infeeds that stand where their voltage cannot be.
    pub misplaced: Vec<Misplaced>,
    /// The lines, cables and apparatus directly at the busbar, as the recovery voltage sees them.
    pub at_busbar: Vec<AtBusbar>,
}

/// What the connection point sees.
#[derive(Clone, Debug)]
pub struct Seen {
    /// All infeeds together, ohm at the system's voltage.
    pub infeed: Infeed,
    /// The nominal voltage of the system.
    pub nominal: ElectricPotential,
    /// The voltage factor c of a fault there.
    pub c: f64,
    /// The frequency.
    pub frequency: Frequency,
}

/// One infeed, for the working.
#[derive(Clone, Debug)]
pub struct Part {
    /// Its name.
    pub name: String,
    /// Where its name stands.
    pub place: Place,
    /// Its own impedance referred to the system's voltage, or what it gives instead.
    pub text: String,
    /// Whether it is a group of motors.
    pub is_motor: bool,
}

/// What cannot be told without a datum.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Off {
    /// Nothing can.
    Everything,
    /// The time constant and the DC component.
    DirectCurrent,
    /// Faults to earth, and the earthing.
    Earth,
    /// The recovery voltage of the network.
    RecoveryVoltage,
}

/// Data that an infeed lacks.
#[derive(Clone, Debug)]
pub struct Lacking {
    /// `infeed T1`, or `system Ring`.
    pub title: String,
    /// Where its heading stands.
    pub place: Place,
    /// What to write.
    pub what: Vec<String>,
    /// What is off without it.
    pub off: Off,
}

/// An infeed where its voltage cannot be.
#[derive(Clone, Debug)]
pub struct Misplaced {
    /// `infeed T1`.
    pub title: String,
    /// Where its voltage is stated, else its heading.
    pub place: Place,
    /// Its voltages.
    pub own: Vec<ElectricPotential>,
    /// The voltage of the place where it stands.
    pub there: ElectricPotential,
}

/// A line, a cable or an apparatus directly at the busbar.
#[derive(Clone, Debug)]
pub struct AtBusbar {
    /// Its name.
    pub name: String,
    /// Where its name stands.
    pub place: Place,
    /// How many side by side.
    pub number: u32,
    /// What it is for a wave.
    pub kind: BusbarKind,
}

/// What something at the busbar is for the recovery voltage.
#[derive(Clone, Debug)]
pub enum BusbarKind {
    /// A line or a cable.
    Line {
        /// Surge impedance, positive sequence.
        positive: Option<ElectricalResistance>,
        /// Surge impedance, zero sequence.
        zero: Option<ElectricalResistance>,
        /// Its length.
        length: Option<Length>,
        /// Whether it feeds nothing, so that its far end is open for a wave.
        open: bool,
    },
    /// A transformer, a reactor or a machine: its own reactance at the busbar's voltage.
    Apparatus {
        /// Whether it is a machine by itself, without a transformer.
        machine: bool,
        /// Its rated power.
        power: Option<Power>,
        /// Its reactance, where it is known.
        reactance: Option<ElectricalResistance>,
        /// Its natural frequency as seen from the busbar.
        natural: Option<Frequency>,
        /// Its capacitance to earth.
        capacitance: Option<Capacitance>,
    },
    /// A network or another source of which no wave is known.
    Other,
}

/// How far the voltage of an infeed may lie off that of its place before it is another voltage: nominal and rated voltages of one
/// level lie within a quarter of each other (IEC 60038 steps, common practice).
const SAME_LEVEL: f64 = 0.25;

/// Whether two voltages are of one level.
fn same_level(a: ElectricPotential, b: ElectricPotential) -> bool {
    let ratio = (a / b).value;
    ratio.is_finite() && (1.0 / (1.0 + SAME_LEVEL)..=1.0 + SAME_LEVEL).contains(&ratio)
}

/// cmax of a nominal voltage; up to 1 kV the lesser one, which corrects impedances less.
fn c_max(nominal: ElectricPotential) -> f64 {
    let at = |percent: f64| standards::voltage_factor(nominal, Ratio::from_si(percent / 100.0));
    at(6.0).or_else(|| at(10.0)).map_or(C_ABOVE, |row| row.c_max)
}

/// cmax above 1 kV, for a voltage that the table does not know (IEC 60909-0, table 1).
const C_ABOVE: f64 = 1.10;

impl Infeeds {
    /// The infeeds of a system at a frequency. Empty where none is described.
    pub fn of(set: &Set, system: SheetId, frequency: Option<Frequency>) -> Self {
        let mut reader = read::Reader::new(set, frequency);
        reader.read(system);
        reader.found
    }

    /// Whether currents follow from them, or would if they said enough: not where there are lines for the recovery voltage only.
    pub fn feeds(&self) -> bool {
        self.seen.is_some() || self.incomplete || self.is_off(Off::Everything)
    }

    /// Where they stand, from the system outwards.
    pub fn places(&self) -> impl Iterator<Item = Place> {
        self.parts.iter().map(|part| part.place)
    }

    /// Whether what is off without a missing datum is off.
    pub fn is_off(&self, off: Off) -> bool {
        self.lacking.iter().any(|lacking| lacking.off == off)
    }
}

/// An impedance as a working shows it.
fn shown(impedance: Impedance) -> String {
    let (r, x) = (impedance.resistance().si(), impedance.reactance().si());
    let sign = if x < 0.0 { "-" } else { "+" };
    format!("{} {sign} j{} ohm", significant(r, 3), significant(x.abs(), 3))
}

/// The nominal voltage and the voltage factor of a system.
fn nominal_of(facts: &Facts) -> Option<(ElectricPotential, f64)> {
    let nominal = facts.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE).filter(|u| u.value.si() > 0.0)?.value;
    let own = facts.quantity::<Ratio>(&system::VOLTAGE_FACTOR).map(|c| c.value.value).filter(|c| *c > 0.0);
    Some((nominal, own.unwrap_or_else(|| c_max(nominal))))
}

/// The infeeds at a system: those into it that stand behind no other.
fn at_system(set: &Set, system: SheetId) -> impl Iterator<Item = SheetId> {
    set.pointing_at(system, "into")
        .filter(|sheet| sheet.kind == SheetKind::Infeed && sheet.target("through").is_none())
        .filter(|sheet| set.pointing_at(sheet.id, "from").next().is_none())
        .map(|sheet| sheet.id)
}

/// How many equal ones stand side by side.
fn number(facts: &Facts) -> u32 {
    facts.quantity::<Ratio>(&infeed::NUMBER_IN_PARALLEL).map_or(1, |count| count.value.value.round().max(1.0) as u32)
}
