//! The duty: what a breaker must meet where it stands, every figure with its working.

mod figure;
mod gas;
mod network;
mod short_circuit;
mod site;
mod switching;
mod trv;

pub use figure::{Figure, Input, Working, percent};
pub use gas::{Certainty, DewPoint, GasDuty, Level, LevelState, Medium, absolute, celsius, told};
pub use network::{AtBusbar, BusbarKind, FromInfeeds, Infeeds, Lacking, Misplaced, NetworkTrv, Off, Part, Seen};
pub(crate) use network::{limited, withstand};
pub(crate) use short_circuit::making_factor_of;
pub use site::{LevelOnSite, SiteDuty};
pub(crate) use site::{stands_in_air, stated_for_site};
pub use switching::{InrushDuty, SwitchingDuty};
pub(crate) use switching::{hundreds, inductance_between_banks, inrush_limit};
pub use trv::TrvDuty;

use crate::case::Case;
use crate::particular::{circuit, system};
use crate::quantity::{
    ElectricCurrent, ElectricPotential, JouleIntegral, Physical, Ratio, ThermodynamicTemperature, Time,
};

/// What a breaker must meet. A figure is absent where the text does not say enough for it.
#[derive(Clone, Debug, Default)]
pub struct Duty {
    /// The highest voltage of the system.
    pub system_voltage: Option<Figure<ElectricPotential>>,
    /// The three-phase short-circuit current at the connection point, growth included.
    pub short_circuit_current: Option<Figure<ElectricCurrent>>,
    /// The single-phase short-circuit current.
    pub single_phase_current: Option<Figure<ElectricCurrent>>,
    /// The largest short-circuit current that the breaker has to break: of three, one, or two phases to earth, or its own share.
    pub breaking_duty: Option<Figure<ElectricCurrent>>,
    /// The symmetrical current at contact separation.
    pub symmetrical_breaking_current: Option<Figure<ElectricCurrent>>,
    /// The time constant of the network.
    pub time_constant: Option<Figure<Time>>,
    /// The peak factor kappa.
    pub peak_factor: Option<Figure<Ratio>>,
    /// The peak short-circuit current.
    pub peak_current: Option<Figure<ElectricCurrent>>,
    /// The thermal equivalent current over the backup clearing time.
    pub thermal_current: Option<Figure<ElectricCurrent>>,
    /// Its heat.
    pub thermal_duty: Option<Figure<JouleIntegral>>,
    /// The heat that the breaker is rated for.
    pub thermal_rated: Option<Figure<JouleIntegral>>,
    /// Time from the fault to contact separation.
    pub separation: Option<Figure<Time>>,
    /// The DC share at contact separation, of the network.
    pub dc_share: Option<Figure<Ratio>>,
    /// The DC share at contact separation, of the rating.
    pub dc_share_rated: Option<Figure<Ratio>>,
    /// The total asymmetrical current at contact separation, of the network.
    pub asymmetrical_current: Option<Figure<ElectricCurrent>>,
    /// The total asymmetrical current at contact separation, of the rating.
    pub asymmetrical_current_rated: Option<Figure<ElectricCurrent>>,
    /// The rated making current: as stated, else by its factor.
    pub making_current_rated: Option<Figure<ElectricCurrent>>,
    /// The rated DC time constant: as stated, else the standard one.
    pub rated_time_constant: Option<Figure<Time>>,
    /// Whether the neutral is effectively earthed.
    pub effectively_earthed: Option<(bool, crate::source::Place)>,
    /// The first-pole-to-clear factor that the earthing asks for.
    pub first_pole_factor: Option<Figure<Ratio>>,
    /// What follows from the infeeds, whether the system states it or not.
    pub infeeds: FromInfeeds,
    /// The standard envelopes.
    pub trv: TrvDuty,
    /// The recovery voltage of the network at the busbar.
    pub network_trv: NetworkTrv,
    /// The largest steady current of a circuit.
    pub load_current: Option<Figure<ElectricCurrent>>,
    /// Lines, cables, banks, reactors and operations.
    pub switching: SwitchingDuty,
    /// What the site makes of the ratings.
    pub site: SiteDuty,
    /// The gas in the cold.
    pub gas: GasDuty,
    /// The second filling of other compartments, in the cold.
    pub other_gas: GasDuty,
}

/// A figure by the name that the json carries.
#[derive(Clone, Debug, PartialEq)]
pub struct NamedFigure {
    /// The name.
    pub key: &'static str,
    /// The value in SI base units; absent where it cannot be known.
    pub value: Option<f64>,
    /// The SI unit.
    pub unit: &'static str,
    /// The working.
    pub working: Option<String>,
    /// Where the statements stand that it rests on, as far as they are known one by one.
    pub places: Vec<crate::source::Place>,
}

impl Duty {
    /// The duty of a case.
    pub fn of(case: &Case<'_>) -> Self {
        let mut duty = Self {
            system_voltage: case
                .system
                .quantity::<ElectricPotential>(&system::HIGHEST_VOLTAGE)
                .map(|stated| Figure::stated("Um", &stated)),
            load_current: load_current(case),
            ..Self::default()
        };
        short_circuit::fill(case, &mut duty);
        trv::fill(case, &mut duty);
        duty.network_trv = NetworkTrv::of(case, &case.infeeds, &duty);
        switching::fill(case, &mut duty);
        site::fill(case, &mut duty);
        duty.gas = GasDuty::of(case);
        duty.other_gas = GasDuty::of_others(case);
        duty
    }

    /// Every figure by its name.
    pub fn figures(&self) -> Vec<NamedFigure> {
        let mut all = vec![
            named("system_voltage", "V", self.system_voltage.as_ref()),
            named("short_circuit_current", "A", self.short_circuit_current.as_ref()),
            named("short_circuit_current_single_phase", "A", self.single_phase_current.as_ref()),
            named("breaking_duty", "A", self.breaking_duty.as_ref()),
            named("symmetrical_breaking_current", "A", self.symmetrical_breaking_current.as_ref()),
            named("peak_current", "A", self.peak_current.as_ref()),
            named("peak_factor", "1", self.peak_factor.as_ref()),
            named("thermal_current", "A", self.thermal_current.as_ref()),
            named("thermal_duty", "A2s", self.thermal_duty.as_ref()),
            named("thermal_rated", "A2s", self.thermal_rated.as_ref()),
            named("dc_time_constant", "s", self.time_constant.as_ref()),
            named("dc_time_constant_rated", "s", self.rated_time_constant.as_ref()),
            named("contact_separation", "s", self.separation.as_ref()),
            named("dc_component", "1", self.dc_share.as_ref()),
            named("dc_component_rated", "1", self.dc_share_rated.as_ref()),
            named("asymmetrical_current", "A", self.asymmetrical_current.as_ref()),
            named("asymmetrical_current_rated", "A", self.asymmetrical_current_rated.as_ref()),
            named("making_current_rated", "A", self.making_current_rated.as_ref()),
            named("first_pole_factor", "1", self.first_pole_factor.as_ref()),
            named("load_current", "A", self.load_current.as_ref()),
            named("r_over_x", "1", self.infeeds.r_over_x.as_ref()),
            named("x0_over_x1", "1", self.infeeds.x0_over_x1.as_ref()),
            named("short_circuit_current_two_phase_earth", "A", self.infeeds.two_phase_earth.as_ref()),
            named("network_trv_peak", "V", self.network_trv.peak.as_ref()),
            named("network_trv_rate", "V/s", self.network_trv.rate.as_ref()),
        ];
        all.extend(self.trv.figures());
        all.extend(self.switching.figures());
        all.extend(self.site.figures());
        all.extend(self.gas.figures());
        all
    }
}

fn named<Q: Physical>(key: &'static str, unit: &'static str, figure: Option<&Figure<Q>>) -> NamedFigure {
    NamedFigure {
        key,
        value: figure.map(|figure| figure.value.si()),
        unit,
        working: figure.map(|figure| figure.working.to_string()),
        places: figure.map(|f| f.places().chain(f.working.infeeds.iter().copied()).collect()).unwrap_or_default(),
    }
}

/// The largest of the load and emergency currents of the circuits.
fn load_current(case: &Case<'_>) -> Option<Figure<ElectricCurrent>> {
    let mut largest: Option<Figure<ElectricCurrent>> = None;
    for circuit in &case.circuits {
        for (symbol, particular) in
            [("load", &circuit::LOAD_CURRENT), ("emergency load", &circuit::EMERGENCY_LOAD_CURRENT)]
        {
            let Some(stated) = circuit.quantity::<ElectricCurrent>(particular) else { continue };
            if largest.as_ref().is_none_or(|old| stated.value > old.value) {
                largest = Some(
                    Figure::new(stated.value, "largest steady current of a circuit", "practice").with(symbol, &stated),
                );
            }
        }
    }
    largest
}

/// The lowest air temperature of the site: of its own line, else the lower end of the range.
pub(crate) fn lowest_ambient<'a>(case: &'a Case<'_>) -> Option<crate::sheet::Stated<'a, ThermodynamicTemperature>> {
    let own = case.site.quantity::<ThermodynamicTemperature>(&crate::particular::site::LOWEST_AMBIENT);
    own.or_else(|| case.site.side(&crate::particular::site::AMBIENT, crate::particular::Limit::Least))
}
