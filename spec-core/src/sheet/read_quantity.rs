//! From the text of a quantity to its reading: units, bounds, what follows, what is said again in brackets.

use firstpole_grammar::Span;
use firstpole_grammar::value::{self, Amount, Bound, Joint, Number, Quantity, Tail as WrittenTail};

use super::Reading;
use super::read_value::Reader;
use super::reading::QuantityReading;
use crate::particular::{Extent, QuantityKind, Tail};
use crate::quantity::{Dimension, Measure, Qualifier, SpeltUnit, Unit, canonical, look_up, rounded, units_of};
use crate::rules::reading as rules;

/// Reads a quantity.
pub(super) fn quantity(reader: &mut Reader<'_>, kind: &QuantityKind) -> Reading {
    let form = format!("a {} such as {}", word(kind), example(kind));
    match value::quantity(reader.text) {
        Ok(written) => assemble(reader, &written, kind).map_or(Reading::Unknown, Reading::Quantity),
        Err(fault) => {
            reader.refuse(&fault, &form);
            Reading::Unknown
        }
    }
}

/// Reads a number that has no unit; with `whole`, a whole number.
pub(super) fn number(reader: &mut Reader<'_>, whole: bool) -> Reading {
    let form = if whole { "a whole number" } else { "a number without a unit" };
    let written = match value::quantity(reader.text) {
        Ok(written) => written,
        Err(fault) => {
            reader.refuse(&fault, form);
            return Reading::Unknown;
        }
    };
    let kind = QuantityKind::of(&[Dimension::PerUnit], &[""]);
    let Some(reading) = assemble(reader, &written, &kind) else { return Reading::Unknown };
    let numbers = [Some(reading.measure), reading.second.map(|(_, measure)| measure)];
    if whole && numbers.into_iter().flatten().any(|m| m.number.fract() != 0.0 || m.number < 0.0) {
        let place = reader.place;
        let message = format!("{} wants a whole number", reader.particular.label);
        reader.find(&rules::UNREADABLE_VALUE, place, message).label("not a whole number");
        return Reading::Unknown;
    }
    Reading::Quantity(reading)
}

fn assemble(reader: &mut Reader<'_>, written: &Quantity, kind: &QuantityKind) -> Option<QuantityReading> {
    if refuse_commas(reader, written) {
        return None;
    }
    let mut qualifiers = Vec::new();
    let mut bound = written.bound;
    let second = written.second.as_ref();
    // In -25 to 40 degC the unit stands once; each side takes that of the other where it has none.
    let fallback = second.map_or(&[][..], |(_, amount)| &amount.unit);
    let first_unit = if written.first.unit.is_empty() { fallback } else { &written.first.unit };
    let first = measure(reader, &written.first, first_unit, kind, &mut qualifiers, &mut bound)?;
    let second = match second {
        None => None,
        Some((Joint::Sum, amount)) if kind.extent != Extent::Sum => {
            let place = reader.at(amount.span);
            let message = format!("{} is one value, not a sum", reader.particular.label);
            reader.find(&rules::UNREADABLE_VALUE, place, message).label("added");
            return None;
        }
        Some((joint, amount)) => {
            let unit = if amount.unit.is_empty() { &written.first.unit } else { &amount.unit };
            Some((*joint, measure(reader, amount, unit, kind, &mut qualifiers, &mut bound)?))
        }
    };
    let place = reader.at(written.span);
    let mut reading = QuantityReading {
        measure: first,
        second,
        bound,
        qualifiers,
        at: None,
        lasting: None,
        tolerance: None,
        again: Vec::new(),
        place,
    };
    for (tail, amount) in &written.tails {
        follow(reader, &mut reading, *tail, amount, kind)?;
    }
    for bracket in &written.brackets {
        reading.again.push(assemble(reader, bracket, kind)?);
    }
    check_qualifier(reader, &reading, kind)?;
    Some(reading)
}

/// What follows a quantity: a voltage, a temperature, a duration, a tolerance.
fn follow(
    reader: &mut Reader<'_>,
    reading: &mut QuantityReading,
    tail: WrittenTail,
    amount: &Amount,
    kind: &QuantityKind,
) -> Option<()> {
    let (dimension, slot, word): (&[Dimension], &mut Option<Measure>, &str) = match (tail, kind.tail) {
        (WrittenTail::At, Tail::AtVoltage) => (&[Dimension::Voltage], &mut reading.at, "at"),
        (WrittenTail::At, Tail::AtTemperature | Tail::PressureReference) => {
            (&[Dimension::Temperature], &mut reading.at, "at")
        }
        (WrittenTail::For, Tail::ForTime) => (&[Dimension::Time], &mut reading.lasting, "for"),
        (WrittenTail::Tolerance, _) => (&[Dimension::Share], &mut reading.tolerance, "+-"),
        (WrittenTail::At | WrittenTail::For, _) => {
            let word = if tail == WrittenTail::At { "at" } else { "for" };
            let message = format!("{} has no {word} after its value", reader.particular.label);
            let place = reader.at(amount.span);
            reader.find(&rules::UNREADABLE_VALUE, place, message).label("does not belong here");
            return None;
        }
    };
    let side = QuantityKind::of(dimension, usual(dimension));
    let (mut none, mut bound) = (Vec::new(), None);
    let measure = measure(reader, amount, &amount.unit, &side, &mut none, &mut bound)?;
    if slot.is_some() {
        let place = reader.at(amount.span);
        reader.find(&rules::UNREADABLE_VALUE, place, format!("{word} stands twice in this value")).label("again");
        return None;
    }
    *slot = Some(measure);
    Some(())
}

fn usual(dimensions: &[Dimension]) -> &'static [&'static str] {
    match dimensions.first() {
        Some(Dimension::Voltage) => &["kV"],
        Some(Dimension::Temperature) => &["degC"],
        Some(Dimension::Time) => &["s"],
        _ => &["%"],
    }
}

/// A number with its unit; the words that are no unit go to `qualifiers` and `bound`.
fn measure(
    reader: &mut Reader<'_>,
    amount: &Amount,
    unit: &[Span],
    kind: &QuantityKind,
    qualifiers: &mut Vec<Qualifier>,
    bound: &mut Option<Bound>,
) -> Option<Measure> {
    if !amount.number.value.is_finite() {
        let place = reader.at(amount.number.span);
        reader.find(&rules::UNREADABLE_VALUE, place, "this number is beyond any quantity").label("too large");
        return None;
    }
    if kind.dimensions == [Dimension::PerUnit] && kind.units == [""] {
        return plain(reader, amount, unit, bound);
    }
    if unit.is_empty() {
        // "operations per day: 4": the label has said the unit.
        if kind.dimensions == [Dimension::CountPerDay] {
            return Some(Measure::new(amount.number.value, amount.number.decimals, canonical(Dimension::CountPerDay)));
        }
        unit_missing(reader, amount, kind);
        return None;
    }
    let (spelt, used) = find_unit(reader, unit, kind)?;
    for span in unit.iter().skip(used) {
        let word = span.of(reader.text);
        if let Some(limit) = limit_word(word) {
            *bound = bound.or(Some(limit));
        } else if let Some(qualifier) = Qualifier::read(word) {
            qualifiers.push(qualifier);
        } else {
            let place = reader.at(*span);
            let message = format!("{word} after {} is not understood", spelt.unit.name);
            reader.find(&rules::UNREADABLE_VALUE, place, message).label("not understood");
            return None;
        }
    }
    qualifiers.extend(spelt.qualifier);
    Some(Measure::new(amount.number.value, amount.number.decimals, spelt.unit))
}

/// A number whose particular has no unit.
fn plain(reader: &mut Reader<'_>, amount: &Amount, unit: &[Span], bound: &mut Option<Bound>) -> Option<Measure> {
    for span in unit {
        let word = span.of(reader.text);
        match limit_word(word) {
            Some(limit) => *bound = bound.or(Some(limit)),
            None if word == "pu" || word == "p.u." => {}
            None => {
                let place = reader.at(*span);
                let message = format!("{} is a plain number; {word} does not belong to it", reader.particular.label);
                let whole = reader.place;
                let number = amount.number.span.of(reader.text).to_owned();
                reader.find(&rules::UNIT_MISMATCH, place, message).label("no unit here").edit(
                    format!("write {number}"),
                    whole,
                    number.clone(),
                );
                return None;
            }
        }
    }
    Some(Measure::new(amount.number.value, amount.number.decimals, canonical(Dimension::PerUnit)))
}

fn limit_word(word: &str) -> Option<Bound> {
    match word.trim_end_matches('.').to_ascii_lowercase().as_str() {
        "min" | "minimum" => Some(Bound::Least),
        "max" | "maximum" => Some(Bound::Greatest),
        _ => None,
    }
}

/// The unit at the beginning of the words, the longest that there is, and how many words it takes.
fn find_unit(reader: &mut Reader<'_>, words: &[Span], kind: &QuantityKind) -> Option<(SpeltUnit, usize)> {
    let spelling = |count: usize| {
        let (first, last) = (words.first()?, words.get(count - 1)?);
        let text = Span::new(first.start, last.end).of(reader.text);
        Some(text.split_whitespace().collect::<Vec<_>>().join(" "))
    };
    let longest = words.len().min(3);
    let found = (1..=longest).rev().find_map(|count| Some((look_up(&spelling(count)?, kind.dimensions)?, count)));
    let first = words.first().copied().unwrap_or_default();
    let place = reader.at(first);
    match found {
        Some((spelt, used)) if kind.dimensions.contains(&spelt.unit.dimension) => Some((spelt, used)),
        Some((spelt, _)) => {
            let message = format!(
                "{} is a unit of {}; {} is a {} ({})",
                spelt.unit.name,
                spelt.unit.dimension.word(),
                reader.particular.label,
                word(kind),
                kind.units.join(", ")
            );
            reader.find(&rules::UNIT_MISMATCH, place, message).label("unit of something else").stated(spelt.unit.name);
            None
        }
        None => {
            let text = first.of(reader.text);
            let near = nearest_unit(text, kind);
            let message = format!("{text} is no unit that is known here; in use are {}", kind.units.join(", "));
            let finding = reader.find(&rules::UNKNOWN_UNIT, place, message);
            finding.label("unknown unit").stated(text);
            if let Some(unit) = near {
                finding.replace_by(unit.name);
            }
            None
        }
    }
}

fn nearest_unit(text: &str, kind: &QuantityKind) -> Option<&'static Unit> {
    kind.dimensions
        .iter()
        .flat_map(|dimension| units_of(*dimension))
        .map(|unit| (strsim::normalized_damerau_levenshtein(&unit.name.to_lowercase(), &text.to_lowercase()), unit))
        .filter(|(near, _)| *near >= 0.5)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, unit)| unit)
}

fn unit_missing(reader: &mut Reader<'_>, amount: &Amount, kind: &QuantityKind) {
    let place = reader.at(amount.number.span);
    let number = amount.number.span.of(reader.text).to_owned();
    let message = format!(
        "{} {number} has no unit; {} is written with {}",
        reader.particular.label,
        word(kind),
        kind.units.join(" or ")
    );
    let finding = reader.find(&rules::UNIT_MISSING, place, message);
    finding.label("unit is missing").stated(number.as_str());
    for unit in kind.units {
        finding.edit(format!("write {number} {unit}"), place, format!("{number} {unit}"));
    }
}

/// `kA rms` where a peak is meant and the reverse: refused, with the conversion as repair.
fn check_qualifier(reader: &mut Reader<'_>, reading: &QuantityReading, kind: &QuantityKind) -> Option<()> {
    let Some(meant) = kind.qualifier else { return Some(()) };
    // An rms making current belongs to the old rating structure, of which a rule of its own speaks.
    if std::ptr::eq(reader.particular, &raw const crate::particular::breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT) {
        return Some(());
    }
    let other = match meant {
        Qualifier::Peak => Qualifier::Rms,
        Qualifier::Rms => Qualifier::Peak,
        Qualifier::Dc => Qualifier::Ac,
        Qualifier::Ac => Qualifier::Dc,
        _ => return Some(()),
    };
    if !reading.is(other) {
        return Some(());
    }
    let message = format!("{} is a value in {}, not in {}", reader.particular.label, meant.word(), other.word());
    let place = reading.place;
    let finding = reader.find(&rules::UNIT_KIND, place, message);
    finding.label(format!("{}, where {} is meant", other.word(), meant.word()));
    let factor = match meant {
        Qualifier::Peak => std::f64::consts::SQRT_2,
        Qualifier::Rms => std::f64::consts::FRAC_1_SQRT_2,
        _ => return None,
    };
    let unit = reading.measure.unit.name;
    let number = reading.measure.number;
    let converted = crate::quantity::significant(number * factor, 3);
    finding.working(format!(
        "{} {unit} {} = {converted} {unit} {} for a sine wave",
        rounded(number, 3),
        other.word(),
        meant.word()
    ));
    finding.edit(
        format!("write {converted} {unit} {}", meant.word()),
        place,
        format!("{converted} {unit} {}", meant.word()),
    );
    finding.edit(
        format!("write {} {unit} {}", rounded(number, 3), meant.word()),
        place,
        format!("{} {unit} {}", rounded(number, 3), meant.word()),
    );
    None
}

fn refuse_commas(reader: &mut Reader<'_>, written: &Quantity) -> bool {
    let amounts = std::iter::once(&written.first)
        .chain(written.second.as_ref().map(|(_, amount)| amount))
        .chain(written.tails.iter().map(|(_, amount)| amount));
    let mut any = false;
    for amount in amounts.filter(|amount| amount.number.comma) {
        comma(reader, amount);
        any = true;
    }
    any
}

/// A comma inside a number: refused, with its readings as repairs.
pub(super) fn comma(reader: &mut Reader<'_>, amount: &Amount) {
    comma_at(reader, amount.number);
}

/// The same for a number alone.
pub(super) fn comma_at(reader: &mut Reader<'_>, number: Number) {
    let text = number.span.of(reader.text).to_owned();
    let place = reader.at(number.span);
    let readings = readings_of(&text);
    let message = match readings.as_slice() {
        [one] => format!("{text} is written with a comma; {one} is meant, if it is a decimal comma"),
        _ => format!(
            "{text} can be read as {}: a number is written with a decimal point and no comma",
            readings.join(" or as ")
        ),
    };
    let finding = reader.find(&rules::DECIMAL_COMMA, place, message);
    finding.label("comma in a number").stated(text.as_str());
    for reading in readings {
        finding.edit(format!("write {reading}"), place, reading);
    }
}

/// What a number with a comma may mean: with the comma as decimal point, and with it between thousands.
fn readings_of(text: &str) -> Vec<String> {
    let mut readings = Vec::new();
    let commas = text.matches(',').count();
    if let Some((whole, fraction)) = text.rsplit_once(',').filter(|_| commas == 1)
        && !fraction.contains('.')
    {
        readings.push(format!("{}.{fraction}", whole.replace('.', "")));
    }
    let (before_point, _) = text.split_once('.').unwrap_or((text, ""));
    let mut groups = before_point.split(',');
    let first = groups.next().unwrap_or("").trim_start_matches(['-', '+', '−']);
    let thousands =
        before_point.contains(',') && (1..=3).contains(&first.len()) && groups.all(|group| group.len() == 3);
    if thousands && !first.starts_with('0') {
        readings.push(text.replace(',', ""));
    }
    if readings.is_empty() {
        readings.push(text.replace(',', "."));
    }
    readings
}

fn word(kind: &QuantityKind) -> &'static str {
    match kind.dimensions.first() {
        None | Some(Dimension::PerUnit) => "number",
        Some(dimension) => dimension.word(),
    }
}

fn example(kind: &QuantityKind) -> String {
    let unit = kind.units.first().copied().unwrap_or("");
    let number = match kind.dimensions.first() {
        Some(Dimension::Voltage) => "145",
        Some(Dimension::Current) => "40",
        Some(Dimension::Temperature) => "-25",
        Some(Dimension::Pressure) => return format!("0.6 {unit} abs"),
        Some(Dimension::ApparentPower) => return format!("2500 {unit} at 110 kV"),
        _ => "20",
    };
    format!("{number} {unit}").trim_end().to_owned()
}

#[cfg(test)]
mod tests {
    use super::readings_of;

    #[test]
    fn a_comma_has_the_readings_that_it_can_have() {
        assert_eq!(readings_of("1,350"), ["1.350", "1350"]);
        assert_eq!(readings_of("31,5"), ["31.5"]);
        assert_eq!(readings_of("0,300"), ["0.300"]);
        assert_eq!(readings_of("1,234,567"), ["1234567"]);
        assert_eq!(readings_of("1.350,5"), ["1350.5"]);
        assert_eq!(readings_of("1,350.5"), ["1350.5"]);
    }
}
