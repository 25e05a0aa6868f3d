//! A computed value with its working, so that a finding, a hover, a schedule and the json all quote the same number.

use crate::quantity::{Physical, significant};
use crate::sheet::Stated;
use crate::source::Place;

/// A computed value with its working.
#[derive(Clone, Debug, PartialEq)]
pub struct Figure<Q> {
    /// The value.
    pub value: Q,
    /// How it came about.
    pub working: Working,
}

/// How a value came about.
#[derive(Clone, Debug, PartialEq)]
pub struct Working {
    /// The formula, with the letters of the standards.
    pub formula: &'static str,
    /// The standard and clause of the formula.
    pub basis: &'static str,
    /// What went into it.
    pub inputs: Vec<Input>,
    /// The result, with its unit.
    pub result: String,
    /// Where the infeeds stand that it rests on, which are summed up in an input.
    pub infeeds: Vec<Place>,
}

/// One input of a working.
#[derive(Clone, Debug, PartialEq)]
pub struct Input {
    /// The letter of the formula.
    pub symbol: &'static str,
    /// The value, with its unit.
    pub text: String,
    /// Where it is stated; absent for constants and for figures computed before.
    pub place: Option<Place>,
}

impl<Q: Physical> Figure<Q> {
    /// A value that follows by `formula`.
    pub fn new(value: Q, formula: &'static str, basis: &'static str) -> Self {
        Self {
            value,
            working: Working { formula, basis, inputs: Vec::new(), result: value.show(), infeeds: Vec::new() },
        }
    }

    /// A value as it is stated.
    pub fn stated(symbol: &'static str, stated: &Stated<'_, Q>) -> Self {
        Self::new(stated.value, "as stated", "the text").with(symbol, stated)
    }

    /// An input that is stated.
    #[must_use]
    pub fn with<I: Physical>(mut self, symbol: &'static str, stated: &Stated<'_, I>) -> Self {
        let place = Some(stated.place());
        self.working.inputs.push(Input { symbol, text: stated.measure.to_string().trim_end().to_owned(), place });
        self
    }

    /// An input that was computed before.
    #[must_use]
    pub fn from<I: Physical>(mut self, symbol: &'static str, figure: &Figure<I>) -> Self {
        let place =
            figure.working.inputs.first().filter(|_| figure.working.formula == "as stated").and_then(|i| i.place);
        self.working.inputs.push(Input { symbol, text: figure.working.result.clone(), place });
        for place in &figure.working.infeeds {
            if !self.working.infeeds.contains(place) {
                self.working.infeeds.push(*place);
            }
        }
        self
    }

    /// An input that is a constant, or an assumption.
    #[must_use]
    pub fn given(mut self, symbol: &'static str, text: impl Into<String>) -> Self {
        self.working.inputs.push(Input { symbol, text: text.into(), place: None });
        self
    }

    /// The result shown in other words than the usual unit (a percentage, a temperature in degC).
    #[must_use]
    pub fn shown(mut self, result: impl Into<String>) -> Self {
        self.working.result = result.into();
        self
    }

    /// That it rests on these infeeds.
    #[must_use]
    pub fn resting_on(mut self, infeeds: impl IntoIterator<Item = Place>) -> Self {
        self.working.infeeds.extend(infeeds);
        self
    }

    /// The places of the statements that it rests on.
    pub fn places(&self) -> impl Iterator<Item = Place> {
        self.working.inputs.iter().filter_map(|input| input.place)
    }
}

impl std::fmt::Display for Working {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.formula)?;
        for (at, input) in self.inputs.iter().enumerate() {
            f.write_str(if at == 0 { " with " } else { ", " })?;
            write!(f, "{} = {}", input.symbol, input.text)?;
        }
        write!(f, ": {}", self.result)
    }
}

/// A share as percent, the way the trade writes it.
pub fn percent(share: f64) -> String {
    format!("{} %", significant(share * 100.0, 3))
}
