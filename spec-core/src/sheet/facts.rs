//! What a sheet states, as rules ask for it.

use std::sync::Arc;

use firstpole_grammar::value::Bound;

use super::{About, Class, Date, Item, Mixture, QuantityReading, Reading, Sequence, Statement};
use crate::particular::{Limit, Particular, Sense};
use crate::quantity::{Frequency, Measure, Physical};
use crate::source::Place;

/// What a sheet states, with what it takes over from others.
#[derive(Clone, Debug, Default)]
pub struct Facts {
    statements: Vec<Arc<Statement>>,
}

/// A value with the statement that states it.
#[derive(Clone, Copy, Debug)]
pub struct Stated<'a, Q> {
    /// The value.
    pub value: Q,
    /// As it was written.
    pub measure: Measure,
    /// The statement.
    pub statement: &'a Statement,
}

impl<Q> Stated<'_, Q> {
    /// Where the value stands.
    pub const fn place(&self) -> Place {
        self.statement.value
    }
}

impl<Q: Physical> Stated<'_, Q> {
    /// `other` in the unit that the author used here.
    pub fn like(&self, other: Q) -> String {
        self.measure.show_like(other.si())
    }
}

impl Facts {
    /// The facts of these statements.
    pub const fn new(statements: Vec<Arc<Statement>>) -> Self {
        Self { statements }
    }

    /// All statements, those of the sheet itself first.
    pub fn statements(&self) -> &[Arc<Statement>] {
        &self.statements
    }

    /// The statements that `which` picks, to be changed.
    pub(crate) fn statements_mut(
        &mut self,
        which: impl Fn(&Statement) -> bool,
    ) -> impl Iterator<Item = &mut Statement> {
        self.statements.iter_mut().filter(move |statement| which(statement)).map(Arc::make_mut)
    }

    /// The statements of a particular, in the order of the text.
    pub fn all<'a>(&'a self, particular: &'a Particular) -> impl Iterator<Item = &'a Statement> {
        self.statements.iter().map(Arc::as_ref).filter(|statement| statement.states(particular))
    }

    /// The statement of a particular, the first where there are several.
    pub fn statement(&self, particular: &Particular) -> Option<&Statement> {
        self.statements.iter().map(Arc::as_ref).find(|statement| statement.states(particular))
    }

    /// Whether anything at all is stated of it, readable or not.
    pub fn mentions(&self, particular: &Particular) -> bool {
        self.statement(particular).is_some()
    }

    /// Whether a reason for it is given.
    pub fn has_reason(&self, particular: &Particular) -> bool {
        self.statements.iter().any(|s| s.about == About::Reason && s.particular.is(particular))
    }

    /// The value of a particular; where it is stated twice, the more onerous one, and of a range or bounds the side that its
    /// sense asks for.
    pub fn quantity<Q: Physical>(&self, particular: &Particular) -> Option<Stated<'_, Q>> {
        let upper = particular.sense != Sense::AtMost && !particular.label.starts_with("lowest");
        self.pick(particular, |reading| if upper { Some(reading.upper()) } else { Some(reading.lower()) }, upper)
    }

    /// The least value: of a range, of `at least`, or of a label with `minimum`; a plain value counts too, and an upper bound
    /// where it is all there is.
    pub fn least<Q: Physical>(&self, particular: &Particular) -> Option<Stated<'_, Q>> {
        self.side(particular, Limit::Least).or_else(|| self.side(particular, Limit::Greatest))
    }

    /// The greatest value, likewise.
    pub fn greatest<Q: Physical>(&self, particular: &Particular) -> Option<Stated<'_, Q>> {
        self.side(particular, Limit::Greatest).or_else(|| self.side(particular, Limit::Least))
    }

    /// The value on one side, where that side is stated.
    pub fn side<Q: Physical>(&self, particular: &Particular, limit: Limit) -> Option<Stated<'_, Q>> {
        let mut found: Option<Stated<'_, Q>> = None;
        for statement in self.statements.iter().map(Arc::as_ref).filter(|s| s.states(particular)) {
            let Some(reading) = statement.quantity() else { continue };
            let other = match limit {
                Limit::Least => statement.limit == Some(Limit::Greatest) || reading.bound == Some(Bound::Greatest),
                Limit::Greatest => statement.limit == Some(Limit::Least) || reading.bound == Some(Bound::Least),
            };
            if other {
                continue;
            }
            let measure = if limit == Limit::Least { reading.lower() } else { reading.upper() };
            found = better(found, stated(statement, measure), limit == Limit::Greatest);
        }
        found
    }

    fn pick<'a, Q: Physical>(
        &'a self,
        particular: &Particular,
        side: impl Fn(&'a QuantityReading) -> Option<&'a Measure>,
        larger: bool,
    ) -> Option<Stated<'a, Q>> {
        let mut found = None;
        for statement in self.statements.iter().map(Arc::as_ref).filter(|s| s.states(particular)) {
            let measure = statement.quantity().and_then(&side);
            found = better(found, measure.and_then(|m| stated(statement, m)), larger);
        }
        found
    }

    /// The reading of a particular, the first that could be read.
    fn reading<'a, T>(
        &'a self,
        particular: &Particular,
        read: impl Fn(&'a Reading) -> Option<T>,
    ) -> Option<(T, &'a Statement)> {
        self.statements
            .iter()
            .map(Arc::as_ref)
            .filter(|s| s.states(particular))
            .find_map(|statement| read(&statement.reading).map(|value| (value, statement)))
    }

    /// The quantity of a particular with all that was written around it.
    pub fn quantity_reading(&self, particular: &Particular) -> Option<(&QuantityReading, &Statement)> {
        self.reading(particular, |r| if let Reading::Quantity(quantity) = r { Some(quantity) } else { None })
    }

    /// The words of a particular.
    pub fn words(&self, particular: &Particular) -> Option<(&[&'static str], &Statement)> {
        self.reading(particular, |r| if let Reading::Words(words) = r { Some(words.as_slice()) } else { None })
    }

    /// The one word of a particular.
    pub fn word(&self, particular: &Particular) -> Option<(&'static str, &Statement)> {
        self.words(particular).and_then(|(words, s)| if let [word] = words { Some((*word, s)) } else { None })
    }

    /// Whether a yes-no particular says yes or no.
    pub fn yes_no(&self, particular: &Particular) -> Option<(bool, &Statement)> {
        self.reading(particular, |r| match r {
            Reading::YesNo(yes) => Some(*yes),
            Reading::None => Some(false),
            _ => None,
        })
    }

    /// The operating sequence of a particular.
    pub fn sequence(&self, particular: &Particular) -> Option<(&Sequence, &Statement)> {
        self.reading(particular, |r| if let Reading::Sequence(sequence) = r { Some(sequence) } else { None })
    }

    /// The classes of a particular.
    pub fn classes(&self, particular: &Particular) -> Option<(&[Class], &Statement)> {
        self.reading(particular, |r| if let Reading::Classes(classes) = r { Some(classes.as_slice()) } else { None })
    }

    /// The class of one letter, where it is stated once.
    pub fn class(&self, particular: &Particular, letter: char) -> Option<(Class, &Statement)> {
        self.classes(particular)
            .and_then(|(classes, s)| classes.iter().find(|class| class.letter == letter).map(|class| (*class, s)))
    }

    /// The gases of a particular.
    pub fn gases(&self, particular: &Particular) -> Option<(&[Mixture], &Statement)> {
        self.reading(particular, |r| if let Reading::Gas(gases) = r { Some(gases.as_slice()) } else { None })
    }

    /// The date of a particular.
    pub fn date(&self, particular: &Particular) -> Option<(Date, &Statement)> {
        self.reading(particular, |r| if let Reading::Date(date) = r { Some(*date) } else { None })
    }

    /// The text of a particular.
    pub fn text(&self, particular: &Particular) -> Option<(&str, &Statement)> {
        self.reading(particular, |r| if let Reading::Text(text) = r { Some(text.as_str()) } else { None })
    }

    /// The list of a particular.
    pub fn list(&self, particular: &Particular) -> Option<(&[Item], &Statement)> {
        self.reading(particular, |r| if let Reading::List(items) = r { Some(items.as_slice()) } else { None })
    }

    /// Turns every time in cycles into seconds.
    pub(crate) fn set_frequency(&mut self, frequency: Frequency) {
        let in_cycles = |statement: &Statement| statement.quantity().is_some_and(QuantityReading::counts_cycles);
        for statement in self.statements_mut(in_cycles) {
            if let Reading::Quantity(quantity) = &mut statement.reading {
                quantity.set_frequency(frequency);
            }
        }
    }
}

fn stated<'a, Q: Physical>(statement: &'a Statement, measure: &Measure) -> Option<Stated<'a, Q>> {
    measure.to().map(|value| Stated { value, measure: *measure, statement })
}

fn better<'a, Q: Physical>(
    old: Option<Stated<'a, Q>>,
    new: Option<Stated<'a, Q>>,
    larger: bool,
) -> Option<Stated<'a, Q>> {
    match (old, new) {
        (Some(old), Some(new)) if (new.value.si() > old.value.si()) == larger && new.value.si() != old.value.si() => {
            Some(new)
        }
        (None, new) => new,
        (old, _) => old,
    }
}
