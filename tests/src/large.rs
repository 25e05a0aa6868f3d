//! Large specifications: the clean examples again and again, with names of their own, a few ratings varied, and some mistakes.

use std::collections::BTreeSet;
use std::fmt::Write;

const STATIONS: [&str; 3] = [
    include_str!("../specifications/cold-climate-245kV.cbspec"),
    concat!(
        include_str!("../specifications/families/transmission-420kV.cbspec"),
        include_str!("../specifications/station-420kV.cbspec")
    ),
    include_str!("../specifications/transmission-72.5kV-60Hz.cbspec"),
];

/// Kinds of sheets whose names are made new; there is one tender a file.
const KINDS: [&str; 6] = ["system", "site", "family", "breaker", "circuit", "infeed"];

/// A specification of at least `lines` lines: stations of several breakers, one after the other. The same number gives the same text.
pub fn large(lines: usize) -> String {
    let mut text = "cbspec 1\n\ntender \"Many stations\"\n    standards: IEC 62271-1:2017, IEC 62271-100:2021\n    \
         order of precedence: \"schedule\", \"text\"\n    reference date of standards: tender date\n\n"
        .to_owned();
    let mut count = text.lines().count();
    let mut number = 0;
    while count < lines {
        let station = station(STATIONS.get(number % STATIONS.len()).copied().unwrap_or(""), number);
        count += station.lines().count();
        text.push_str(&station);
        number += 1;
    }
    text
}

/// One station with its number in every name.
fn station(template: &str, number: usize) -> String {
    let names: BTreeSet<&str> = template.lines().filter_map(named).collect();
    let mut text = String::with_capacity(template.len() + 512);
    let mut kept = false;
    for line in template.lines() {
        if !line.starts_with([' ', '#']) && !line.is_empty() {
            kept = named(line).is_some();
            if kept {
                let words = line
                    .split_whitespace()
                    .map(|word| if names.contains(word) { format!("{word}-{number}") } else { word.to_owned() });
                text.push_str(&words.collect::<Vec<_>>().join(" "));
                text.push('\n');
            }
            continue;
        }
        if kept {
            // Every seventh station has a mistake, every third another load.
            let line = match number {
                n if n % 7 == 0 => line.replace("31.5 kA for", "25 kA for").replace("M2", "M1"),
                n if n % 3 == 0 => line.replace("load current:                            1", "load current: 2"),
                _ => line.to_owned(),
            };
            // A write to a string cannot fail.
            let _ = writeln!(text, "{line}");
        }
    }
    text
}

/// The name in a heading whose sheet is kept.
fn named(line: &str) -> Option<&str> {
    let mut words = line.split_whitespace();
    let kind = words.next()?;
    KINDS.contains(&kind).then(|| words.next()).flatten()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn as_long_as_asked_and_the_same_each_time() {
        let text = large(2_000);
        assert!((2_000..2_400).contains(&text.lines().count()), "{}", text.lines().count());
        assert_eq!(text, large(2_000));
    }
}
