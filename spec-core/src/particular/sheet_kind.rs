//! The kinds of sheets, and the links that their headings may have.

/// A kind of sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum SheetKind {
    /// What holds for the whole tender.
    Tender,
    /// The network at the connection point.
    System,
    /// One source of short-circuit current.
    Infeed,
    /// Service conditions.
    Site,
    /// Particulars of a breaker that others take over.
    Family,
    /// The apparatus to be bought.
    Breaker,
    /// One thing that a breaker switches.
    Circuit,
    /// What a bidder guarantees.
    Offer,
    /// A requirement of the buyer's own organisation.
    HouseRule,
    /// A finding that was accepted.
    Deviation,
}

impl SheetKind {
    /// All of them, in the order of the language's description.
    pub const ALL: [Self; 10] = [
        Self::Tender,
        Self::System,
        Self::Infeed,
        Self::Site,
        Self::Family,
        Self::Breaker,
        Self::Circuit,
        Self::Offer,
        Self::HouseRule,
        Self::Deviation,
    ];

    /// The word that heads such a sheet.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Tender => "tender",
            Self::System => "system",
            Self::Infeed => "infeed",
            Self::Site => "site",
            Self::Family => "family",
            Self::Breaker => "breaker",
            Self::Circuit => "circuit",
            Self::Offer => "offer",
            Self::HouseRule => "house-rule",
            Self::Deviation => "deviation",
        }
    }

    /// The kind whose word is nearest to `word`, if one is near.
    pub fn nearest(word: &str) -> Option<Self> {
        let lower = word.to_lowercase();
        Self::ALL
            .into_iter()
            .map(|kind| (strsim::normalized_damerau_levenshtein(kind.word(), &lower), kind))
            .filter(|(near, _)| *near >= 0.7)
            .max_by(|a, b| a.0.total_cmp(&b.0))
            .map(|(_, kind)| kind)
    }

    /// The kind that a word heads.
    pub fn read(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|kind| kind.word().eq_ignore_ascii_case(word))
    }

    /// The words of links that its heading may have, each with what it points at.
    pub const fn links(self) -> &'static [(&'static str, Target)] {
        match self {
            Self::Tender | Self::System | Self::Site | Self::HouseRule => &[],
            Self::Infeed => &[
                ("into", Target::Sheet(&[Self::System])),
                ("through", Target::Sheet(&[Self::Infeed])),
                ("from", Target::Sheet(&[Self::System, Self::Infeed])),
            ],
            Self::Family => &[("like", Target::Sheet(&[Self::Family]))],
            Self::Breaker => &[
                ("on", Target::Sheet(&[Self::System])),
                ("at", Target::Sheet(&[Self::Site])),
                ("like", Target::Sheet(&[Self::Family, Self::Breaker])),
            ],
            Self::Circuit | Self::Offer => &[("for", Target::Sheet(&[Self::Breaker]))],
            Self::Deviation => &[
                ("from", Target::Rule),
                ("in", Target::Sheet(&[Self::Breaker, Self::System, Self::Site, Self::Tender])),
            ],
        }
    }

    /// Whether its heading has a name of its own.
    pub const fn named(self) -> bool {
        !matches!(self, Self::Deviation)
    }
}

/// What the link of a heading points at.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Target {
    /// A sheet of one of these kinds.
    Sheet(&'static [SheetKind]),
    /// A rule.
    Rule,
}
