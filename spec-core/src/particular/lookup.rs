//! How a label is read.

use std::collections::HashMap;
use std::sync::LazyLock;

use super::words::folded;
use super::{Particular, SheetKind, breaker, circuit, deviation, house_rule, infeed, offer, site, system, tender};

/// Which bound a label sets.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Limit {
    /// `minimum ...`.
    Least,
    /// `maximum ...`.
    Greatest,
}

/// What a label means.
#[derive(Clone, Copy, Debug)]
pub enum Found {
    /// A particular, or a bound of it.
    Particular {
        /// The particular.
        particular: &'static Particular,
        /// The bound that the label sets.
        limit: Option<Limit>,
    },
    /// Why a particular is wanted.
    ReasonFor(&'static Particular),
    /// What a report proves of a particular.
    TypeTested(&'static Particular),
}

/// The outcome of looking a label up.
#[derive(Clone, Debug)]
pub enum Lookup {
    /// It is known.
    Found(Found),
    /// It is a symbol that the trade uses for two things.
    Refused {
        /// The symbol.
        symbol: &'static str,
        /// What it may mean.
        readings: Vec<&'static Particular>,
    },
    /// It is not known in this sheet.
    Unknown,
}

/// Words before a label that set a bound of it.
const BOUNDS: [(&str, Limit); 6] = [
    ("minimum ", Limit::Least),
    ("min ", Limit::Least),
    ("least ", Limit::Least),
    ("maximum ", Limit::Greatest),
    ("max ", Limit::Greatest),
    ("greatest ", Limit::Greatest),
];

/// The labels and symbols of one sheet.
struct Labels {
    declared: Vec<&'static Particular>,
    by_label: HashMap<String, &'static Particular>,
    by_symbol: HashMap<&'static str, &'static Particular>,
    refused: HashMap<&'static str, Vec<&'static Particular>>,
}

impl Labels {
    fn of(declared: Vec<&'static Particular>) -> Self {
        let mut labels =
            Self { declared, by_label: HashMap::new(), by_symbol: HashMap::new(), refused: HashMap::new() };
        for particular in &labels.declared {
            for wording in std::iter::once(&particular.label).chain(particular.wordings) {
                labels.by_label.entry(folded(wording)).or_insert(particular);
            }
            for symbol in particular.symbols {
                labels.by_symbol.entry(symbol).or_insert(particular);
            }
            for symbol in particular.refused {
                labels.refused.entry(symbol).or_default().push(particular);
            }
        }
        labels
    }

    fn exact(&self, label: &str, folded_label: &str) -> Option<&'static Particular> {
        self.by_symbol.get(label).or_else(|| self.by_label.get(folded_label)).copied()
    }

    /// The label itself, or with `rated` added or left out.
    fn with_or_without_rated(&self, label: &str, folded_label: &str) -> Option<&'static Particular> {
        self.exact(label, folded_label).or_else(|| match folded_label.strip_prefix("rated ") {
            Some(rest) => self.by_label.get(rest).copied(),
            None => self.by_label.get(&format!("rated {folded_label}")).copied(),
        })
    }

    fn find(&self, label: &str) -> Option<(&'static Particular, Option<Limit>)> {
        let folded_label = folded(label);
        if let Some(particular) = self.with_or_without_rated(label, &folded_label) {
            return Some((particular, None));
        }
        BOUNDS.iter().find_map(|(word, limit)| {
            let rest = folded_label.strip_prefix(word)?;
            let symbol = label.split_whitespace().next_back().unwrap_or("");
            self.with_or_without_rated(symbol, rest).map(|particular| (particular, Some(*limit)))
        })
    }
}

static LABELS: LazyLock<HashMap<SheetKind, Labels>> = LazyLock::new(|| {
    let breaker: Vec<_> = breaker::GROUPS.iter().copied().flatten().copied().collect();
    SheetKind::ALL
        .into_iter()
        .map(|kind| {
            let declared = match kind {
                SheetKind::Tender => tender::ALL.to_vec(),
                SheetKind::System => system::ALL.to_vec(),
                SheetKind::Infeed => infeed::ALL.to_vec(),
                SheetKind::Site => site::ALL.to_vec(),
                SheetKind::Family | SheetKind::Breaker => breaker.clone(),
                SheetKind::Circuit => circuit::ALL.to_vec(),
                SheetKind::Offer => offer::ALL.iter().chain(&breaker).copied().collect(),
                SheetKind::HouseRule => house_rule::ALL.to_vec(),
                SheetKind::Deviation => deviation::ALL.to_vec(),
            };
            (kind, Labels::of(declared))
        })
        .collect()
});

/// What `label` means in a sheet.
pub fn find(sheet: SheetKind, label: &str) -> Lookup {
    let Some(labels) = LABELS.get(&sheet) else { return Lookup::Unknown };
    if let Some((particular, limit)) = labels.find(label) {
        return Lookup::Found(Found::Particular { particular, limit });
    }
    if let Some((symbol, readings)) = labels.refused.get_key_value(label.trim()) {
        return Lookup::Refused { symbol, readings: refused_readings(sheet, symbol, readings) };
    }
    match sheet {
        SheetKind::Breaker | SheetKind::Family => {
            let plain = folded(label);
            let about = ["reason for ", "justification of "]
                .iter()
                .find_map(|start| plain.starts_with(start).then(|| label.trim().get(start.len()..).unwrap_or("")))
                .or_else(|| {
                    plain.ends_with(" because").then(|| label.trim().get(..label.trim().len() - 8).unwrap_or(""))
                });
            about.and_then(|rest| labels.find(rest.trim())).map(|(p, _)| Lookup::Found(Found::ReasonFor(p)))
        }
        SheetKind::Offer => {
            let plain = folded(label);
            let about = ["type tested ", "tested "]
                .iter()
                .find_map(|start| plain.starts_with(start).then(|| label.trim().get(start.len()..).unwrap_or("")));
            about.and_then(|rest| labels.find(rest.trim())).map(|(p, _)| Lookup::Found(Found::TypeTested(p)))
        }
        _ => None,
    }
    .unwrap_or(Lookup::Unknown)
}

/// The readings of a refused symbol: those of this sheet, and the other thing that the trade means by it.
fn refused_readings(sheet: SheetKind, symbol: &str, own: &[&'static Particular]) -> Vec<&'static Particular> {
    let mut readings = own.to_vec();
    let other = match (sheet, symbol) {
        (SheetKind::Breaker | SheetKind::Family | SheetKind::Offer, "Us") => Some(&breaker::RATED_VOLTAGE),
        (SheetKind::System, "Ik") => Some(&system::SHORT_CIRCUIT_CURRENT),
        (SheetKind::System, "Us") => Some(&system::SWITCHING_IMPULSE_LEVEL_NEEDED_ON_SITE),
        (_, "Id") => Some(&breaker::DC_CURRENT_AT_CONTACT_SEPARATION),
        (_, "Ic") => Some(&breaker::RATED_CONTINUOUS_CURRENT),
        (_, "p_re") => Some(&breaker::MINIMUM_FUNCTIONAL_PRESSURE),
        _ => None,
    };
    readings.extend(other);
    readings
}

/// The other sheets in which a label is known.
pub fn others_with_label(sheet: SheetKind, label: &str) -> Vec<SheetKind> {
    SheetKind::ALL
        .into_iter()
        .filter(|other| *other != sheet && !matches!(other, SheetKind::Family | SheetKind::Offer))
        .filter(|other| matches!(find(*other, label), Lookup::Found(_)))
        .collect()
}

/// The labels and wordings of a sheet that are nearest to `label`, the nearest first; none if nothing is near.
pub fn nearest(sheet: SheetKind, label: &str, most: usize) -> Vec<&'static str> {
    let wanted = folded(label);
    let mut near: Vec<(f64, &'static str, &'static Particular)> = declared(sheet)
        .iter()
        .flat_map(|p| std::iter::once(&p.label).chain(p.wordings).map(move |wording| (*wording, *p)))
        .map(|(wording, p)| (strsim::normalized_damerau_levenshtein(&folded(wording), &wanted), wording, p))
        .filter(|(near, _, _)| *near >= 0.6)
        .collect();
    near.sort_by(|a, b| b.0.total_cmp(&a.0).then(a.1.cmp(b.1)));
    // One wording of each particular is enough.
    let mut taken: Vec<&'static Particular> = Vec::new();
    near.retain(|(_, _, p)| {
        let new = !taken.iter().any(|t| t.is(p));
        taken.push(p);
        new
    });
    near.into_iter().take(most).map(|(_, wording, _)| wording).collect()
}

/// The particulars that may stand in a sheet, in the order of the schedule.
pub fn declared(sheet: SheetKind) -> &'static [&'static Particular] {
    LABELS.get(&sheet).map_or(&[], |labels| labels.declared.as_slice())
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeMap;

    use super::*;
    use crate::particular::Kind;
    use crate::quantity::look_up;

    fn label_of(sheet: SheetKind, label: &str) -> Option<(&'static str, Option<Limit>)> {
        match find(sheet, label) {
            Lookup::Found(Found::Particular { particular, limit }) => Some((particular.label, limit)),
            _ => None,
        }
    }

    #[test]
    fn capitals_and_blanks_do_not_count_in_a_label() {
        assert_eq!(label_of(SheetKind::Breaker, "Rated   VOLTAGE"), Some(("rated voltage", None)));
        assert_eq!(label_of(SheetKind::System, "x/r"), Some(("X/R", None)));
    }

    #[test]
    fn capitals_count_in_a_symbol() {
        assert_eq!(label_of(SheetKind::System, "ip"), Some(("peak short-circuit current", None)));
        assert_eq!(label_of(SheetKind::Breaker, "Ip"), Some(("rated peak withstand current", None)));
        assert_eq!(label_of(SheetKind::Breaker, "ip"), None);
        assert_eq!(label_of(SheetKind::System, "Ik\""), Some(("short-circuit current", None)));
        assert_eq!(label_of(SheetKind::Infeed, "xd\""), Some(("subtransient reactance", None)));
    }

    #[test]
    fn further_wordings_of_both_communities() {
        for label in [
            "rated interrupting current",
            "symmetrical interrupting capability",
            "Isc",
            "short-circuit breaking current",
        ] {
            assert_eq!(
                label_of(SheetKind::Breaker, label),
                Some(("rated short-circuit breaking current", None)),
                "{label}"
            );
        }
        assert_eq!(label_of(SheetKind::Breaker, "BIL"), Some(("rated lightning impulse withstand voltage", None)));
    }

    #[test]
    fn rated_may_be_left_out_or_added() {
        assert_eq!(label_of(SheetKind::Breaker, "normal current"), Some(("rated continuous current", None)));
        assert_eq!(label_of(SheetKind::Breaker, "rated opening time"), Some(("opening time", None)));
    }

    #[test]
    fn minimum_and_maximum_set_a_bound_unless_they_belong_to_the_label() {
        assert_eq!(label_of(SheetKind::Breaker, "maximum opening time"), Some(("opening time", Some(Limit::Greatest))));
        assert_eq!(label_of(SheetKind::Breaker, "min opening time"), Some(("opening time", Some(Limit::Least))));
        assert_eq!(label_of(SheetKind::Site, "minimum ambient"), Some(("lowest ambient", None)));
        assert_eq!(
            label_of(SheetKind::Breaker, "minimum functional pressure"),
            Some(("minimum functional pressure", None))
        );
    }

    #[test]
    fn braces_stand_for_each_of_their_words() {
        assert_eq!(label_of(SheetKind::Breaker, "T60 RRRV"), Some(("T60 rate of rise", None)));
        assert_eq!(label_of(SheetKind::Breaker, "RRRV"), Some(("T100 rate of rise", None)));
        assert_eq!(label_of(SheetKind::Breaker, "uc"), Some(("T100 TRV peak", None)));
        assert_eq!(label_of(SheetKind::Breaker, "busbar rated current"), Some(("busbar rated current", None)));
    }

    #[test]
    fn reasons_and_tested_values_go_with_every_label() {
        assert!(
            matches!(find(SheetKind::Breaker, "reason for Ur"), Lookup::Found(Found::ReasonFor(p)) if p.label == "rated voltage")
        );
        let tested = find(SheetKind::Offer, "type-tested DC time constant");
        assert!(matches!(tested, Lookup::Found(Found::TypeTested(p)) if p.label == "DC time constant"));
    }

    #[test]
    fn ambiguous_symbols_are_refused_with_their_readings() {
        for (sheet, symbol) in [
            (SheetKind::Breaker, "Us"),
            (SheetKind::System, "Us"),
            (SheetKind::System, "Ik"),
            (SheetKind::Breaker, "Id"),
            (SheetKind::Breaker, "Ic"),
        ] {
            let Lookup::Refused { readings, .. } = find(sheet, symbol) else { panic!("{symbol} is not refused") };
            assert_eq!(readings.len(), 2, "{symbol}: {:?}", readings.iter().map(|p| p.label).collect::<Vec<_>>());
        }
        assert_eq!(label_of(SheetKind::Breaker, "Ik"), Some(("rated short-time withstand current", None)));
    }

    #[test]
    fn the_nearest_label_is_proposed_and_the_other_sheet_named() {
        assert_eq!(
            nearest(SheetKind::Breaker, "rated continous current", 3).first(),
            Some(&"rated continuous current")
        );
        assert!(nearest(SheetKind::Breaker, "qwertyuiop", 3).is_empty());
        assert_eq!(others_with_label(SheetKind::Breaker, "altitude"), [SheetKind::Site]);
    }

    /// No two particulars of a sheet claim one wording or one symbol.
    #[test]
    fn every_label_has_one_meaning_in_its_sheet() {
        for sheet in SheetKind::ALL {
            let mut claimed: BTreeMap<String, &str> = BTreeMap::new();
            for particular in declared(sheet).iter().filter(|p| p.sheet == sheet) {
                let wordings = std::iter::once(&particular.label).chain(particular.wordings).map(|w| folded(w));
                let symbols = particular.symbols.iter().map(|s| format!("symbol {s}"));
                for claim in wordings.chain(symbols) {
                    if let Some(other) = claimed.insert(claim.clone(), particular.label) {
                        panic!("{}: {claim} is claimed by {other} and {}", sheet.word(), particular.label);
                    }
                }
            }
        }
    }

    #[test]
    fn every_declaration_is_whole() {
        let mut count = 0;
        for sheet in SheetKind::ALL {
            for particular in declared(sheet).iter().filter(|p| p.sheet == sheet) {
                count += 1;
                let label = particular.label;
                assert!(particular.meaning.ends_with('.'), "{label}: {}", particular.meaning);
                assert!(!particular.basis.is_empty(), "{label}: no basis");
                if let Kind::Quantity(kind) | Kind::WordsOrQuantity(_, kind) = &particular.kind {
                    for unit in kind.units {
                        assert!(
                            look_up(unit, kind.dimensions).is_some_and(|u| kind.dimensions.contains(&u.unit.dimension)),
                            "{label}: {unit}"
                        );
                    }
                    assert!(!kind.units.is_empty(), "{label}: no unit");
                }
            }
        }
        // The dictionary of the language has 362 rows; rows with braces stand for several, and a few stand in two sheets.
        assert!(count >= 362, "{count}");
    }
}
