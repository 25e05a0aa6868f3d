//! Hints in the text: what `from duty` chose, and values that follow from a line.

use firstpole_core::case::{Case, as_written};
use firstpole_core::duty::{NamedFigure, celsius, percent};
use firstpole_core::particular::{Particular, SheetKind, breaker, circuit, system};
use firstpole_core::quantity::{
    ElectricCurrent, ElectricPotential, Physical, ThermodynamicTemperature, Time, VoltageRate,
};
use firstpole_core::sheet::{Sheet, Statement};
use firstpole_core::{Assessment, FileId, Place, Span};

/// A hint in the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Hint {
    /// After which byte it is shown.
    pub at: u32,
    /// What it says.
    pub text: String,
    /// The value that was chosen, as an author would write it; absent where nothing was left to be chosen.
    pub value: Option<String>,
    /// How that came about.
    pub working: String,
}

/// Which hints are wanted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Wanted {
    /// What `from duty` chose.
    pub chosen: bool,
    /// The time constant of the network, at what it follows from.
    pub time_constant: bool,
    /// The peak of a short-circuit current.
    pub peak: bool,
    /// The DC share at contact separation, at the opening time.
    pub dc_share: bool,
    /// Peak and rate of rise of T100, at the first-pole-to-clear factor or the rated voltage.
    pub trv: bool,
    /// The dew point, at the filling pressure.
    pub dew_point: bool,
    /// The charging current of a line.
    pub charging_current: bool,
}

impl Default for Wanted {
    fn default() -> Self {
        Self {
            chosen: true,
            time_constant: true,
            peak: true,
            dc_share: true,
            trv: true,
            dew_point: true,
            charging_current: true,
        }
    }
}

/// So many breakers may say different things at one line; more would hide the line.
const MOST_AT_ONE_LINE: usize = 3;

/// The hints of the part `within` of a file.
pub fn hints(assessment: &Assessment, file: FileId, within: Span, wanted: Wanted) -> Vec<Hint> {
    let mut all = if wanted.chosen { chosen(assessment, file, within) } else { Vec::new() };
    let derived: Vec<&Derived> = DERIVED.iter().filter(|derived| (derived.wanted)(wanted)).collect();
    let length = assessment.sources.file(file).map_or(0, |source| source.text.len());
    for (sheet, case) in assessment.set.of_kind(SheetKind::Breaker).zip(assessment.cases()) {
        for derived in &derived {
            let Some(at) = place_of(assessment, sheet, derived, file, within) else { continue };
            let Some((text, working)) = told(derived, &case.duty) else { continue };
            let same = |hint: &&Hint| hint.at == at && hint.text.starts_with(derived.word);
            if all.iter().filter(same).any(|hint| hint.working == working)
                || all.iter().filter(same).count() >= MOST_AT_ONE_LINE
                || at as usize > length
            {
                continue;
            }
            // The first needs no name unless a second says something else.
            let text = if all.iter().any(|hint| same(&hint)) { format!("{text} in {}", sheet.name) } else { text };
            all.push(Hint { at, text, value: None, working });
        }
    }
    all.sort_by(|a, b| (a.at, &a.text).cmp(&(b.at, &b.text)));
    all
}

/// What `from duty` chose. A value that several breakers take over gets one for each that chose otherwise.
pub fn chosen(assessment: &Assessment, file: FileId, within: Span) -> Vec<Hint> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let mut hints: Vec<Hint> = Vec::new();
    let here = |place: Place| {
        let at = assessment.at(place);
        at.file == file && within.touches(at.span.end)
    };
    for sheet in assessment.set.of_kind(SheetKind::Breaker) {
        // Most sheets leave nothing to the duty, and a case is the dearest thing there is.
        let asks = assessment.set.facts(sheet.id).statements().iter().any(|statement| {
            here(statement.value) && matches!(statement.reading, firstpole_core::sheet::Reading::FromDuty)
        });
        if !asks {
            continue;
        }
        let case = Case::new(&assessment.set, sheet, assessment.policy());
        for statement in case.breaker.statements() {
            let (Some(working), Some(value)) = (&statement.chosen, as_written(&statement.reading)) else { continue };
            if !here(statement.value) {
                continue;
            }
            let own = statement.value.block() == sheet.heading.block();
            let text = if own { value.clone() } else { format!("{value} in {}", sheet.name) };
            let hint =
                Hint { at: assessment.span(statement.value).end, text, value: Some(value), working: working.clone() };
            if !hints.contains(&hint) {
                hints.push(hint);
            }
        }
    }
    hints.retain(|hint| hint.at as usize <= source.text.len());
    hints.sort_by(|a, b| (a.at, &a.text).cmp(&(b.at, &b.text)));
    hints
}

/// A value that follows from a line.
struct Derived {
    wanted: fn(Wanted) -> bool,
    /// How the hint begins.
    word: &'static str,
    /// Where the line stands.
    sheet: At,
    /// What is stated there: the first of these that is.
    lines: &'static [&'static Particular],
    /// The figures of the duty that it shows, the first of which has to be there.
    figures: &'static [Part],
}

/// A figure by its name, the words before it, and how it is shown.
type Part = (&'static str, &'static str, fn(f64) -> String);

#[derive(Clone, Copy)]
enum At {
    Breaker,
    System,
    Circuit,
}

fn show<Q: Physical>(si: f64) -> String {
    Q::from_si(si).show()
}

fn peak(si: f64) -> String {
    format!("{} peak", show::<ElectricCurrent>(si))
}

fn degrees(si: f64) -> String {
    celsius(ThermodynamicTemperature::from_si(si))
}

static DERIVED: [Derived; 7] = [
    Derived {
        wanted: |wanted| wanted.time_constant,
        word: "tau ",
        sheet: At::System,
        lines: &[&system::X_OVER_R],
        figures: &[("dc_time_constant", "tau ", show::<Time>)],
    },
    Derived {
        wanted: |wanted| wanted.peak,
        word: "ip ",
        sheet: At::System,
        lines: &[&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL],
        figures: &[("peak_current", "ip ", peak)],
    },
    Derived {
        wanted: |wanted| wanted.peak,
        word: "Ip ",
        sheet: At::Breaker,
        lines: &[&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT],
        figures: &[("making_current_rated", "Ip ", peak)],
    },
    Derived {
        wanted: |wanted| wanted.dc_share,
        word: "DC ",
        sheet: At::Breaker,
        lines: &[&breaker::OPENING_TIME],
        figures: &[("dc_component", "DC ", percent), ("dc_component_rated", "rated ", percent)],
    },
    Derived {
        wanted: |wanted| wanted.trv,
        word: "T100 ",
        sheet: At::Breaker,
        lines: &[&breaker::FIRST_POLE_TO_CLEAR_FACTOR, &breaker::RATED_VOLTAGE],
        figures: &[("trv_t100_uc", "T100 uc ", show::<ElectricPotential>), ("trv_t100_rrrv", "", show::<VoltageRate>)],
    },
    Derived {
        wanted: |wanted| wanted.dew_point,
        word: "dew point ",
        sheet: At::Breaker,
        lines: &[&breaker::RATED_FILLING_PRESSURE],
        figures: &[("gas_dew_point_filling", "dew point ", degrees)],
    },
    Derived {
        wanted: |wanted| wanted.charging_current,
        word: "charging ",
        sheet: At::Circuit,
        lines: &[&circuit::LENGTH],
        figures: &[("line_charging_current", "charging ", show::<ElectricCurrent>)],
    },
];

fn place_of(assessment: &Assessment, sheet: &Sheet, derived: &Derived, file: FileId, within: Span) -> Option<u32> {
    let set = &assessment.set;
    let stated = |id| {
        let facts = set.facts(id);
        derived.lines.iter().find_map(|particular| facts.statement(particular))
    };
    let statement: &Statement = match derived.sheet {
        At::Breaker => stated(sheet.id)?,
        At::System => stated(sheet.target("on")?)?,
        At::Circuit => {
            // One figure for a breaker: it says of which line only where there is one.
            let mut lines = set.pointing_at(sheet.id, "for").filter(|s| s.kind == SheetKind::Circuit);
            let found = lines.find_map(|circuit| stated(circuit.id))?;
            if lines.any(|circuit| stated(circuit.id).is_some()) {
                return None;
            }
            found
        }
    };
    let place = assessment.at(statement.value);
    let at = place.span.end;
    (place.file == file && statement.quantity().is_some() && within.touches(at)).then_some(at)
}

fn told(derived: &Derived, duty: &[NamedFigure]) -> Option<(String, String)> {
    let mut texts = Vec::new();
    let mut workings = Vec::new();
    for (at, (key, word, show)) in derived.figures.iter().enumerate() {
        let figure = duty.iter().find(|figure| figure.key == *key);
        let Some((figure, value)) = figure.and_then(|figure| Some((figure, figure.value?))) else {
            if at == 0 {
                return None;
            }
            continue;
        };
        // What only repeats a line is no news.
        if figure.working.as_ref().is_some_and(|working| working.starts_with("as stated")) {
            if at == 0 {
                return None;
            }
            continue;
        }
        texts.push(format!("{word}{}", show(value)));
        workings.extend(figure.working.clone());
    }
    Some((texts.join(", "), workings.join("\n")))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed};

    const ALL: Span = Span::new(0, 100_000);

    /// The line that a hint stands behind, with the hint.
    fn lines(text: &str, wanted: Wanted) -> Vec<String> {
        let all = hints(&assessed(text), FileId(0), ALL, wanted);
        let line =
            |hint: &Hint| text.get(..hint.at as usize).and_then(|text| text.rsplit('\n').next()).map(str::to_owned);
        all.iter().map(|hint| format!("{} -> {}", line(hint).unwrap_or_default().trim(), hint.text)).collect()
    }

    #[test]
    fn what_was_chosen_stands_behind_the_value() {
        let hints = chosen(&assessed(BAY), FileId(0), ALL);
        let [hint] = hints.as_slice() else { panic!("{hints:?}") };
        assert!(BAY.get(..hint.at as usize).expect("before").ends_with("from duty"));
        assert!(hint.text.ends_with(" kA") || hint.text.contains("kA peak"), "{}", hint.text);
        assert!(!hint.working.is_empty());
    }

    #[test]
    fn only_what_is_seen() {
        assert!(hints(&assessed(BAY), FileId(0), Span::new(0, 40), Wanted::default()).is_empty());
        let unknown = BAY.replace("Isc:                31.5 kA\n", "");
        assert!(chosen(&assessed(&unknown), FileId(0), ALL).is_empty());
    }

    #[test]
    fn what_is_taken_over_names_the_breaker() {
        let text = BAY.replace("    making current:     from duty\n", "").replace("at Yard\n", "at Yard like Big\n")
            + "family Big\n    making current: from duty\n";
        let hints = chosen(&assessed(&text), FileId(0), ALL);
        assert_eq!(hints.len(), 1);
        assert!(hints.first().is_some_and(|hint| hint.text.ends_with(" in LineBay")), "{hints:?}");
    }

    /// tau = X/R / (2 pi f) = 21/314.16 = 66.8 ms; uc of T100 at 145 kV and 1.3 is 215 kV (IEC 56:1987, public digest).
    #[test]
    fn what_follows_stands_behind_what_it_follows_from() {
        let text = BAY
            .replace("    DC time", "    opening time: 30 ms\n    kpp: 1.3\n    DC time")
            .replace("    making current:     from duty\n", "");
        let all = lines(&text, Wanted::default());
        for (line, hint) in [
            ("X/R:                21", "tau 66.8 ms"),
            ("short-circuit current: 28.4 kA", "ip 7"),
            ("Isc:                31.5 kA", "Ip 7"),
            ("opening time: 30 ms", "DC 5"),
            ("kpp: 1.3", "T100 uc 215 kV, 2 kV/us"),
            ("rated filling pressure: 0.70 MPa abs", "dew point -"),
        ] {
            assert!(all.iter().any(|told| told.starts_with(&format!("{line} -> {hint}"))), "{line} {hint}: {all:#?}");
        }
    }

    #[test]
    fn each_kind_can_be_switched_off() {
        let text = BAY.replace("    DC time", "    opening time: 30 ms\n    DC time");
        let all = lines(&text, Wanted::default()).len();
        let off = |change: fn(&mut Wanted)| {
            let mut wanted = Wanted::default();
            change(&mut wanted);
            all - lines(&text, wanted).len()
        };
        assert_eq!(off(|w| w.chosen = false), 1);
        assert_eq!(off(|w| w.time_constant = false), 1);
        assert_eq!(off(|w| w.peak = false), 1, "the making current has a line of its own");
        assert_eq!(off(|w| w.dc_share = false), 1);
        assert_eq!(off(|w| w.dew_point = false), 1);
    }

    #[test]
    fn a_line_that_breakers_share_says_it_once() {
        let text = BAY.to_owned() + "breaker Second on Ring132 at Yard\n    rated voltage: 145 kV\n";
        let all = lines(&text, Wanted::default());
        assert_eq!(all.iter().filter(|told| told.contains("tau ")).count(), 1, "{all:#?}");
    }
}
