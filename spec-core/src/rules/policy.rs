//! Thresholds of policy, and the keys by which a buyer sets them.

use serde::de::{DeserializeSeed, Error, MapAccess, Visitor};
use serde::{Deserialize, Deserializer};

use crate::quantity::{Dimension, look_up, significant};

/// Thresholds of policy. They belong to the buyer, so none of them is a literal in a rule.
///
/// It reads itself with serde from a table whose keys are those of [`SETTINGS`]; what is not set keeps its default. A key that is
/// not known, a value of the wrong form, and one out of sense are errors at their place.
#[derive(Clone, Debug, PartialEq)]
pub struct Policy {
    /// Relative difference up to which two units of one statement agree.
    pub dual_tolerance: f64,
    /// Difference up to which two statements of one temperature agree, K.
    pub dual_temperature_tolerance: f64,
    /// Relative difference up to which time constant, X/R and peak current of one network agree.
    pub time_constant_tolerance: f64,
    /// Relative difference up to which a fault level in MVA and one in kA agree.
    pub fault_level_tolerance: f64,
    /// Relative difference up to which a time constant or X0/X1 may be more favourable than that of the infeeds.
    pub infeed_constant_tolerance: f64,
    /// How far a making or peak current may lie below its factor times the breaking current.
    pub making_below: f64,
    /// How far it may lie above before it is an excess.
    pub making_above: f64,
    /// How far a stated TRV value may lie off the standard's.
    pub trv_tolerance: f64,
    /// Steps of the preferred series above the duty from which a rating is an excess.
    pub excess_steps: usize,
    /// Share of the current at which a coil moves up to which it may carry a supervision current.
    pub supervision_share: f64,
    /// Reserve between relay plus break time and the critical clearing time, s.
    pub clearing_margin: f64,
    /// Reserve of the breaking current over the duty where the tender states none, as a share of the rating.
    pub short_circuit_margin: f64,
    /// Years over which operations and growth are counted where the tender states no service life.
    pub service_life: f64,
    /// Extreme demands upon one breaker from which they are told together.
    pub extremes: usize,
    /// Least ratio of a reduced lightning impulse level to the protective level of the arresters.
    pub lightning_margin: f64,
    /// Length from which a line of 300 kV and above asks for a study of its switching overvoltage, m.
    pub long_line: f64,
    /// Whether the tender counts as issued whatever its status says.
    pub issued: bool,
    /// The day on which deviations are held against their expiry; without one, none expires.
    pub today: Option<crate::sheet::Date>,
}

impl Default for Policy {
    fn default() -> Self {
        Self {
            dual_tolerance: 0.01,
            dual_temperature_tolerance: 0.5,
            time_constant_tolerance: 0.05,
            fault_level_tolerance: 0.05,
            infeed_constant_tolerance: 0.10,
            making_below: 0.02,
            making_above: 0.05,
            trv_tolerance: 0.02,
            excess_steps: 2,
            supervision_share: 0.1,
            clearing_margin: 0.020,
            short_circuit_margin: 0.0,
            service_life: 30.0,
            extremes: 5,
            lightning_margin: 1.2,
            long_line: 200e3,
            issued: false,
            today: None,
        }
    }
}

/// The form of a setting.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SettingForm {
    /// A text with a share: `"5 %"`.
    Share,
    /// A text with a difference of temperature: `"0.5 K"`.
    Kelvin,
    /// A text with a time: `"20 ms"`.
    Time,
    /// A text with a time in years: `"30 years"`.
    Years,
    /// A text with a length: `"200 km"`.
    Length,
    /// A plain number.
    Ratio,
    /// A whole number.
    Count,
}

/// A setting: one threshold under the key by which a buyer sets it.
#[derive(Debug)]
pub struct Setting {
    /// Its key.
    pub key: &'static str,
    /// Its form.
    pub form: SettingForm,
    /// The least value that makes sense, as the policy has it.
    pub least: f64,
    /// The greatest.
    pub greatest: f64,
    /// What it is.
    pub meaning: &'static str,
    get: fn(&Policy) -> f64,
    set: fn(&mut Policy, f64),
}

macro_rules! settings {
    ($($key:literal = $field:ident $(as $whole:ident)?, $form:ident, $least:literal to $greatest:literal, $meaning:literal;)*) => {
        /// Every setting, in the order of the reference page.
        pub static SETTINGS: &[Setting] = &[$(Setting {
            key: $key,
            form: SettingForm::$form,
            least: $least,
            greatest: $greatest,
            meaning: $meaning,
            get: |policy| f64::from(policy.$field $(as $whole)?),
            set: |policy, value| settings!(@set policy.$field, value $(, $whole)?),
        }),*];
    };
    (@set $target:expr, $value:ident) => { $target = $value };
    (@set $target:expr, $value:ident, $whole:ident) => { $target = $value as usize };
}

settings! {
    "short-circuit-margin" = short_circuit_margin, Share, 0.0 to 0.5,
        "Reserve of the rated breaking current over the duty, as a share of the rating; what the tender states counts before it.";
    "service-life" = service_life, Years, 1.0 to 100.0,
        "Over how many years operations and growth are counted where the tender states no service life.";
    "clearing-margin" = clearing_margin, Time, 0.0 to 0.5,
        "Reserve between relay time plus break time and the critical clearing time.";
    "lightning-margin" = lightning_margin, Ratio, 1.0 to 3.0,
        "Least ratio of a lightning impulse level to the protective level of the arresters.";
    "excess-steps" = excess_steps as u32, Count, 1.0 to 10.0,
        "Steps of the preferred series above the duty from which a rating is an excess.";
    "extreme-demands" = extremes as u32, Count, 2.0 to 10.0,
        "Extreme demands upon one breaker from which they are told together.";
    "making-rounding-below" = making_below, Share, 0.0 to 0.1,
        "How far a making or peak current may lie below its factor times the breaking current.";
    "making-rounding-above" = making_above, Share, 0.0 to 0.5,
        "How far it may lie above before it is an excess.";
    "trv-rounding" = trv_tolerance, Share, 0.0 to 0.1,
        "How far a stated TRV value may lie off the standard's.";
    "two-units-agree-within" = dual_tolerance, Share, 0.0 to 0.1,
        "Difference up to which a value and the same in another unit agree.";
    "two-temperatures-agree-within" = dual_temperature_tolerance, Kelvin, 0.0 to 5.0,
        "The same for temperatures.";
    "time-constants-agree-within" = time_constant_tolerance, Share, 0.0 to 0.2,
        "Difference up to which time constant, X/R and peak current of one network agree.";
    "fault-levels-agree-within" = fault_level_tolerance, Share, 0.0 to 0.2,
        "Difference up to which a fault level in MVA and one in kA agree.";
    "infeeds-agree-within" = infeed_constant_tolerance, Share, 0.0 to 0.3,
        "Difference up to which a time constant or X0/X1 may be more favourable than that of the infeeds.";
    "long-line" = long_line, Length, 10e3 to 1000e3,
        "Length from which a line of 300 kV and above asks for a study of its switching overvoltage.";
    "supervision-share" = supervision_share, Share, 0.01 to 0.5,
        "Share of the current at which a coil moves up to which it may carry a supervision current.";
}

/// A year in seconds, as the unit of the text has it.
const YEAR: f64 = 365.25 * 86_400.0;

impl SettingForm {
    /// How a value of this form is written, for messages.
    pub const fn example(self) -> &'static str {
        match self {
            Self::Share => "a share with its unit in quotes, such as \"5 %\"",
            Self::Kelvin => "a difference in K in quotes, such as \"0.5 K\"",
            Self::Time => "a time with its unit in quotes, such as \"20 ms\"",
            Self::Years => "a time with its unit in quotes, such as \"30 years\"",
            Self::Length => "a length with its unit in quotes, such as \"200 km\"",
            Self::Ratio => "a number, such as 1.2",
            Self::Count => "a whole number, such as 2",
        }
    }

    /// A value of the policy as it is written in a file.
    pub fn written(self, value: f64) -> String {
        match self {
            Self::Share => format!("\"{} %\"", significant(value * 100.0, 4)),
            Self::Kelvin => format!("\"{} K\"", significant(value, 4)),
            Self::Time => format!("\"{} ms\"", significant(value * 1e3, 4)),
            Self::Years => format!("\"{} years\"", significant(value, 4)),
            Self::Length => format!("\"{} km\"", significant(value * 1e-3, 4)),
            Self::Ratio | Self::Count => significant(value, 4),
        }
    }

    const fn dimension(self) -> Option<Dimension> {
        match self {
            Self::Share => Some(Dimension::Share),
            Self::Kelvin => Some(Dimension::TemperatureDifference),
            Self::Time | Self::Years => Some(Dimension::Time),
            Self::Length => Some(Dimension::Length),
            Self::Ratio | Self::Count => None,
        }
    }

    /// The value of a text such as `5 %`.
    fn read(self, text: &str) -> Option<f64> {
        let dimension = self.dimension()?;
        let text = text.trim();
        let end = text.find(|c: char| !(c.is_ascii_digit() || matches!(c, '.' | '-' | '+'))).unwrap_or(text.len());
        let (number, unit) = text.split_at(end);
        let unit = look_up(unit, &[dimension]).filter(|spelt| spelt.unit.dimension == dimension)?.unit;
        let si = unit.to_si(number.parse().ok()?)?;
        Some(if self == Self::Years { si / YEAR } else { si })
    }
}

impl Setting {
    /// Its value where a file does not set it, as it is written in a file.
    pub fn default_written(&self) -> String {
        self.form.written((self.get)(&Policy::default()))
    }

    /// The values that make sense, as they are written in a file.
    pub fn range_written(&self) -> String {
        format!("{} to {}", self.form.written(self.least), self.form.written(self.greatest))
    }

    fn checked<E: Error>(&self, value: f64) -> Result<f64, E> {
        let slack = 1e-9 * self.greatest.abs();
        // A comparison that also refuses what is no number.
        if value >= self.least - slack && value <= self.greatest + slack {
            return Ok(value);
        }
        Err(E::custom(format_args!(
            "{} is set to {}, which makes no sense: it lies within {}",
            self.key,
            self.form.written(value),
            self.range_written()
        )))
    }
}

/// The setting of a key, or a sentence that says that there is none.
fn setting(key: &str) -> Result<&'static Setting, String> {
    if let Some(found) = SETTINGS.iter().find(|setting| setting.key == key) {
        return Ok(found);
    }
    let near = SETTINGS
        .iter()
        .map(|setting| (strsim::normalized_damerau_levenshtein(setting.key, &key.to_lowercase()), setting.key))
        .filter(|(near, _)| *near >= 0.5)
        .max_by(|a, b| a.0.total_cmp(&b.0));
    Err(match near {
        Some((_, near)) => format!("there is no setting {key}; {near} is near"),
        None => {
            let all: Vec<&str> = SETTINGS.iter().map(|setting| setting.key).collect();
            format!("there is no setting {key}; there are {}", all.join(", "))
        }
    })
}

/// Reads a key, so that an error stands at the key.
struct Key;

impl<'de> DeserializeSeed<'de> for Key {
    type Value = &'static Setting;

    fn deserialize<D: Deserializer<'de>>(self, deserializer: D) -> Result<Self::Value, D::Error> {
        let key = String::deserialize(deserializer)?;
        setting(&key).map_err(D::Error::custom)
    }
}

/// Reads the value of a setting, so that an error stands at the value.
struct Value(&'static Setting);

impl<'de> DeserializeSeed<'de> for Value {
    type Value = f64;

    fn deserialize<D: Deserializer<'de>>(self, deserializer: D) -> Result<f64, D::Error> {
        deserializer.deserialize_any(self)
    }
}

impl Visitor<'_> for Value {
    type Value = f64;

    fn expecting(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.0.form.example())
    }

    fn visit_i64<E: Error>(self, value: i64) -> Result<f64, E> {
        if self.0.form.dimension().is_some() {
            return Err(E::invalid_type(serde::de::Unexpected::Signed(value), &self));
        }
        self.0.checked(value as f64)
    }

    fn visit_u64<E: Error>(self, value: u64) -> Result<f64, E> {
        self.visit_i64(i64::try_from(value).unwrap_or(i64::MAX))
    }

    fn visit_f64<E: Error>(self, value: f64) -> Result<f64, E> {
        if self.0.form != SettingForm::Ratio {
            return Err(E::invalid_type(serde::de::Unexpected::Float(value), &self));
        }
        self.0.checked(value)
    }

    fn visit_str<E: Error>(self, value: &str) -> Result<f64, E> {
        match self.0.form.read(value) {
            Some(read) => self.0.checked(read),
            None => Err(E::invalid_value(serde::de::Unexpected::Str(value), &self)),
        }
    }
}

struct Table;

impl<'de> Visitor<'de> for Table {
    type Value = Policy;

    fn expecting(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str("a table of settings")
    }

    fn visit_map<A: MapAccess<'de>>(self, mut map: A) -> Result<Policy, A::Error> {
        let mut policy = Policy::default();
        while let Some(setting) = map.next_key_seed(Key)? {
            let value = map.next_value_seed(Value(setting))?;
            (setting.set)(&mut policy, value);
        }
        Ok(policy)
    }
}

impl<'de> Deserialize<'de> for Policy {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_map(Table)
    }
}

#[cfg(test)]
mod tests {
    use serde::de::value::{Error as Told, MapDeserializer};

    use super::*;

    fn read(key: &str, value: &str) -> Result<Policy, Told> {
        Policy::deserialize(MapDeserializer::new([(key, value)].into_iter()))
    }

    /// Every default is within its own bounds, and comes back as it is written.
    #[test]
    fn defaults_make_sense() {
        for setting in SETTINGS {
            let default = (setting.get)(&Policy::default());
            let held: Result<f64, Told> = setting.checked(default);
            assert_eq!(held, Ok(default), "{}", setting.key);
            assert!(setting.key.chars().all(|c| c.is_ascii_lowercase() || c == '-'), "{}", setting.key);
            if setting.form.dimension().is_some() {
                let policy = read(setting.key, setting.default_written().trim_matches('"')).expect(setting.key);
                assert!(((setting.get)(&policy) - default).abs() < 1e-9, "{}", setting.key);
            }
            // The field that is read is the one that is set.
            let mut policy = Policy::default();
            (setting.set)(&mut policy, setting.greatest);
            assert!(((setting.get)(&policy) - setting.greatest).abs() < 1e-9, "{}", setting.key);
            assert_ne!(policy, Policy::default(), "{}", setting.key);
        }
    }

    #[test]
    fn values_with_their_units() {
        let near = |a: f64, b: f64| (a - b).abs() < 1e-9;
        assert!(near(read("short-circuit-margin", "10 %").expect("a share").short_circuit_margin, 0.1));
        assert!(near(read("clearing-margin", "0.03 s").expect("a time").clearing_margin, 0.03));
        assert!(near(read("service-life", "40 years").expect("a time").service_life, 40.0));
    }

    #[test]
    fn what_is_wrong_is_told() {
        let told = |key: &str, value: &str| read(key, value).expect_err("an error").to_string();
        assert!(told("short-circut-margin", "10 %").contains("short-circuit-margin is near"));
        assert!(told("colour", "red").contains("there are short-circuit-margin, service-life"));
        for value in ["10", "10 ms", "ten %", "% 10", ""] {
            assert!(told("short-circuit-margin", value).contains("such as \"5 %\""), "{value}");
        }
        assert!(told("excess-steps", "2").contains("a whole number"));
        let numbers = |value: f64| Policy::deserialize(MapDeserializer::new([("service-life", value)].into_iter()));
        let told_of: Result<Policy, Told> = numbers(30.0);
        assert!(told_of.expect_err("no unit").to_string().contains("30 years"));
    }

    /// 50 % is the greatest margin.
    #[test]
    fn out_of_sense() {
        assert!(read("short-circuit-margin", "50 %").is_ok());
        let told = read("short-circuit-margin", "50.1 %").expect_err("too much").to_string();
        assert!(told.contains("\"50.1 %\"") && told.contains("\"0 %\" to \"50 %\""), "{told}");
        assert!(read("short-circuit-margin", "-1 %").is_err());
    }
}
