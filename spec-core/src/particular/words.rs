//! The lists of words that particulars choose from, each word with its further spellings.

/// A list of words.
#[derive(Debug)]
pub struct WordList {
    /// What the list is of, for messages.
    pub name: &'static str,
    /// Its words.
    pub words: &'static [Word],
}

/// One word (or phrase) of a list.
#[derive(Debug)]
pub struct Word {
    /// As we write it.
    pub word: &'static str,
    /// Further accepted spellings.
    pub also: &'static [&'static str],
}

impl WordList {
    /// The word that `text` spells; case, width of blanks and hyphens do not count.
    pub fn read(&self, text: &str) -> Option<&'static str> {
        let wanted = folded(text);
        self.words
            .iter()
            .find(|w| folded(w.word) == wanted || w.also.iter().any(|a| folded(a) == wanted))
            .map(|w| w.word)
    }

    /// All words of the list.
    pub fn all(&self) -> impl Iterator<Item = &'static str> {
        self.words.iter().map(|w| w.word)
    }
}

/// `text` in small letters, with single blanks and every hyphen read as a blank.
pub fn folded(text: &str) -> String {
    let plain = crate::quantity::normalised(text).to_lowercase().replace('-', " ");
    plain.split_whitespace().collect::<Vec<_>>().join(" ")
}

macro_rules! word_lists {
    ($($name:ident = $what:literal: [$($word:literal $(or [$($also:literal),+])?),+ $(,)?];)*) => {$(
        #[doc = concat!("The words for ", $what, ".")]
        pub static $name: WordList = WordList {
            name: $what,
            words: &[$(Word { word: $word, also: &[$($($also),+)?] }),+],
        };
    )*};
}

word_lists! {
    AUTO_RECLOSING = "reclosing schemes": [
        "none",
        "three-phase",
        "single-phase",
        "single-phase and three-phase",
    ];
    BANK_NEUTRAL = "neutrals of a bank": [
        "earthed",
        "isolated",
        "earthed through a reactor",
    ];
    CABLE_CONSTRUCTION = "cable constructions": [
        "screened",
        "belted",
    ];
    CIRCUIT_KIND = "kinds of circuit": [
        "overhead line" or ["line"],
        "cable",
        "overhead line with cable",
        "cable network",
        "capacitor bank",
        "filter bank",
        "shunt reactor",
        "transformer",
        "generator",
        "motor",
        "arc furnace",
        "traction",
        "pumped storage",
        "bus coupler" or ["bus tie"],
        "bus section",
        "spare",
    ];
    CONNECTION = "what leaves the busbar": [
        "overhead lines",
        "cables",
        "overhead lines and cables",
        "transformers only",
    ];
    CONNECTION_BY = "connections": [
        "bars",
        "cable",
        "gas-insulated duct",
    ];
    CONSTRUCTION = "constructions": [
        "live tank",
        "dead tank",
        "gas-insulated" or ["GIS"],
        "hybrid" or ["mixed technology"],
        "disconnecting",
        "withdrawable" or ["drawout", "truck"],
        "metal-clad",
        "metal-enclosed",
        "pole-mounted",
        "generator circuit-breaker" or ["generator breaker"],
        "any",
    ];
    CONTROLLED_SWITCHING = "operations at a chosen instant": [
        "none",
        "closing",
        "opening",
        "closing and opening",
    ];
    CORROSION = "corrosivity categories": [
        "C1",
        "C2",
        "C3",
        "C4",
        "C5",
        "CX",
    ];
    DENSITY_MONITOR = "places of a density monitor": [
        "in the gas",
        "on the tank" or ["at the tank"],
        "apart, heated" or ["apart and heated", "remote, heated"],
        "apart, unheated" or ["apart and unheated", "remote, unheated", "apart", "remote"],
    ];
    DRIVE = "drives": [
        "spring",
        "hydraulic",
        "hydraulic-spring",
        "pneumatic",
        "magnetic",
        "motor",
        "any",
    ];
    EXTERNAL_INSULATION = "parts in the air of the site": [
        "none",
        "bushings only",
        "all",
    ];
    GAS = "gases": [
        "SF6",
        "N2",
        "O2",
        "CO2",
        "CF4",
        "CF3I",
        "C4F7N",
        "C5F10O",
        "air",
        "dry air" or ["synthetic air"],
        "none",
        "free",
    ];
    GWP_BASIS = "tables of warming potentials": [
        "EU 2024/573",
        "EU 517/2014",
        "40 CFR 98",
        "AR4",
        "AR5",
        "AR6",
    ];
    INFEED_KIND = "kinds of infeed": [
        "network",
        "transformer",
        "overhead line",
        "cable",
        "generator",
        "power station unit",
        "motor group",
        "converter plant",
        "series reactor",
        "impedance",
    ];
    INSTALLATION = "places of installation": [
        "outdoor",
        "indoor",
    ];
    INSULATION_STATED_FOR = "airs that insulation is stated for": [
        "standard atmosphere",
        "site altitude",
    ];
    INSULATOR_MATERIAL = "insulator materials": [
        "porcelain",
        "composite",
        "resin",
        "any",
    ];
    INTERRUPTER = "interrupters": [
        "vacuum",
        "gas",
        "self-blast",
        "puffer",
        "oil",
        "air-blast",
        "any",
    ];
    JURISDICTION = "jurisdictions": [
        "EU",
        "California",
        "other",
    ];
    LEVEL_VALID_WITH = "switching states": [
        "all sources in service",
        "bus section closed",
        "bus section open",
        "reduced infeed",
    ];
    LOW_GAS_ACTION = "actions at the lockout level": [
        "block",
        "trip and lock out",
    ];
    MITIGATION = "measures of mitigation": [
        "controlled opening",
        "controlled closing",
        "opening resistor",
        "closing resistor",
        "surge arresters",
        "RC snubber",
        "inrush limiting reactor",
        "staggered switching",
        "capacitor to earth",
        "capacitor across reactor",
        "grading capacitor",
        "low-surge contacts",
        "none",
    ];
    NEUTRAL = "ways to earth the neutral": [
        "solidly earthed" or ["solidly grounded", "solid", "directly earthed", "directly grounded"],
        "effectively earthed" or ["effectively grounded"],
        "not effectively earthed" or ["not effectively grounded", "non-effectively earthed", "non-effectively grounded"],
        "low-resistance earthed" or ["low-resistance grounded"],
        "high-resistance earthed" or ["high-resistance grounded"],
        "reactance earthed" or ["reactance grounded"],
        "impedance earthed" or ["impedance grounded"],
        "resonant earthed" or ["resonant grounded", "compensated", "Petersen coil", "arc-suppression coil"],
        "isolated" or ["ungrounded", "unearthed", "insulated"],
    ];
    POLE_OPERATION = "ways to drive the poles": [
        "single-pole" or ["one drive a pole"],
        "three-pole" or ["gang operated", "three-pole (gang operated)", "gang"],
    ];
    POLLUTION = "pollution classes": [
        "a" or ["very light", "a very light", "a (very light)"],
        "b" or ["light", "b light", "b (light)"],
        "c" or ["medium", "c medium", "c (medium)"],
        "d" or ["heavy", "d heavy", "d (heavy)"],
        "e" or ["very heavy", "e very heavy", "e (very heavy)"],
    ];
    REFERENCE_DATE = "the reference date of standards": [
        "latest edition",
        "tender date",
    ];
    SEISMIC_LEVEL = "seismic levels": [
        "low",
        "moderate",
        "high",
    ];
    SERIES_REACTOR_SIDE = "sides of a reactor": [
        "line side",
        "bus side",
    ];
    SHORT_LINE_FAULT_DUTIES = "short-line fault duties": [
        "L90",
        "L75",
        "L60",
    ];
    STATUS = "the status of a tender": [
        "draft",
        "for review",
        "issued",
    ];
    TEMPERATURE_CLASS = "classes of lowest ambient temperature": [
        "minus 5 indoor" or ["minus 5 degC indoor", "-5 indoor", "-5 degC indoor", "indoor minus 5", "indoor -5"],
        "minus 15 indoor" or ["minus 15 degC indoor", "-15 indoor", "-15 degC indoor", "indoor minus 15", "indoor -15"],
        "minus 25 indoor" or ["minus 25 degC indoor", "-25 indoor", "-25 degC indoor", "indoor minus 25", "indoor -25"],
        "minus 10 outdoor" or ["minus 10 degC outdoor", "-10 outdoor", "-10 degC outdoor", "outdoor minus 10", "outdoor -10"],
        "minus 15 outdoor" or ["minus 15 degC outdoor", "-15 outdoor", "-15 degC outdoor", "outdoor minus 15", "outdoor -15"],
        "minus 25 outdoor" or ["minus 25 degC outdoor", "-25 outdoor", "-25 degC outdoor", "outdoor minus 25", "outdoor -25"],
        "minus 30 outdoor" or ["minus 30 degC outdoor", "-30 outdoor", "-30 degC outdoor", "outdoor minus 30", "outdoor -30"],
        "minus 40 outdoor" or ["minus 40 degC outdoor", "-40 outdoor", "-40 degC outdoor", "outdoor minus 40", "outdoor -40"],
        "minus 50 outdoor" or ["minus 50 degC outdoor", "-50 outdoor", "-50 degC outdoor", "outdoor minus 50", "outdoor -50"],
    ];
}
