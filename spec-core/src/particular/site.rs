//! Particulars of the sheet `site`. Service conditions.

use crate::particular::{Extent, Kind, QuantityKind, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Site, "site";
    INSTALLATION = "installation" {
        wordings: ["location"],
        kind: Kind::Words { list: &words::INSTALLATION, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "In the open or under a roof and behind walls.",
    }
    LOWEST_AMBIENT = "lowest ambient" {
        wordings: ["lowest ambient temperature", "minimum ambient", "minimum ambient temperature", "min ambient"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "The lowest air temperature to be expected.",
    }
    HIGHEST_AMBIENT = "highest ambient" {
        wordings: ["highest ambient temperature", "maximum ambient", "maximum ambient temperature", "max ambient"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "The highest air temperature to be expected.",
    }
    AMBIENT = "ambient" {
        wordings: ["ambient temperature", "ambient range", "ambient air temperature"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"]).extending(Extent::Range)),
        sense: Range,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Lowest and highest in one line (-20 to 40 degC).",
    }
    MEAN_AMBIENT_OVER_24_H = "mean ambient over 24 h" {
        wordings: ["daily mean temperature"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: AtMost,
        carried: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "The highest mean of a day.",
    }
    LOWEST_RECORDED_TEMPERATURE = "lowest recorded temperature" {
        wordings: ["record low"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: Exact,
        basis: "practice",
        meaning: "What the weather record shows, to judge the class asked for.",
    }
    ALTITUDE = "altitude" {
        wordings: ["elevation", "height above sea level"],
        symbols: ["H"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["m", "ft"])),
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Above sea level; from 1000 m the external insulation is corrected.",
    }
    POLLUTION = "pollution" {
        wordings: ["pollution class", "site pollution severity", "pollution level", "contamination level"],
        kind: Kind::Words { list: &words::POLLUTION, alternatives: false },
        sense: Exact,
        basis: "IEC 60815-1 (memory)",
        meaning: "Site pollution severity.",
    }
    CORROSION = "corrosion" {
        wordings: ["corrosion class", "corrosivity category"],
        kind: Kind::Words { list: &words::CORROSION, alternatives: false },
        sense: Exact,
        basis: "ISO 9223 (memory)",
        meaning: "How hard the air is on steel.",
    }
    ICE = "ice" {
        wordings: ["ice thickness", "ice coating"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm", "in"]).or_none()),
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Ice to be expected.",
    }
    WIND = "wind" {
        wordings: ["wind speed"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Speed], &["m/s", "km/h", "mph"]).or_none()),
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Wind to be expected.",
    }
    WIND_AT_LOWEST_AMBIENT = "wind at lowest ambient" {
        wordings: ["concurrent wind"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Speed], &["m/s"])),
        sense: Exact,
        basis: "practice",
        meaning: "Wind that comes together with the greatest cold.",
    }
    SOLAR_RADIATION = "solar radiation" {
        wordings: ["sun", "insolation"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Irradiance], &["W/m2"])),
        sense: Exact,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Sun at noon on a clear day.",
    }
    HUMIDITY = "humidity" {
        wordings: ["relative humidity"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: AtMost,
        carried: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Mean over a day.",
    }
    SEISMIC_ACCELERATION = "seismic acceleration" {
        wordings: ["earthquake", "ground acceleration", "seismic", "peak ground acceleration"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Acceleration], &["g", "m/s2"]).or_none()),
        sense: Exact,
        basis: "IEC 62271-300/-207, IEEE 693 (memory)",
        meaning: "Horizontal ground acceleration, or none.",
    }
    ATMOSPHERIC_PRESSURE = "atmospheric pressure" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["kPa"])),
        sense: Exact,
        basis: "ISA (memory)",
        meaning: "To turn gauge into absolute; absent: from the altitude.",
    }
    STATION_BATTERY = "station battery" {
        wordings: ["battery voltage", "station DC supply"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["V"]).as_(Qualifier::Dc)),
        sense: Exact,
        basis: "practice",
        meaning: "What the station has; compared with what the breaker asks.",
    }
    STATION_AC_SUPPLY = "station AC supply" {
        wordings: ["auxiliary AC supply", "station service"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["V"]).as_(Qualifier::Ac)),
        sense: Exact,
        basis: "practice",
        meaning: "What the station has for motor and heater.",
    }
    STATION_AC_PHASES = "station AC phases" {
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "Single-phase or three-phase station supply.",
    }
    CLEARANCE_TO_EARTH = "clearance to earth" {
        wordings: ["phase-to-earth clearance"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm"])),
        sense: AtLeast,
        basis: "IEC 60071-2, 61936-1 (memory)",
        meaning: "The least distance in air that the station keeps.",
    }
    HEIGHT_OF_LIVE_PARTS = "height of live parts" {
        wordings: ["live-part height", "ground clearance"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["m"])),
        sense: AtLeast,
        basis: "IEC 61936-1 (memory)",
        meaning: "Least height of live parts above the walkway that the station keeps.",
    }
    JURISDICTION = "jurisdiction" {
        wordings: ["legal territory"],
        kind: Kind::WordsOrText(&words::JURISDICTION),
        sense: Exact,
        basis: "Reg. (EU) 2024/573; 17 CCR 95352 (memory)",
        meaning: "Whose law on gases holds; also in a site, where it replaces the tender's.",
    }
    COMMISSIONING = "commissioning" {
        wordings: ["put into operation", "putting into operation", "energisation", "in-service date"],
        kind: Kind::Date,
        sense: Exact,
        basis: "Reg. (EU) 2024/573 Art. 13(9) (memory)",
        meaning: "When the breaker is first put into operation; also in a site or a breaker, where it replaces the tender's.",
    }
}
