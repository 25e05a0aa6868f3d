//! Where a sheet is defined, and where its name stands.

use firstpole_core::sheet::{Sheet, Statement};
use firstpole_core::{Assessment, FileId, Place, Span};

use super::spot::{name_at, names, sheet_at, sheets_of, statement_at};

/// Where the sheet is defined whose name an offset touches; of a particular, the sheet's own line that it replaces through `like`.
pub fn definition(assessment: &Assessment, file: FileId, offset: u32) -> Option<Place> {
    if let Some(named) = name_at(assessment, file, offset) {
        return Some(named.sheet.name_place);
    }
    let (sheet, statement) = stated_at(assessment, file, offset)?;
    let above = std::iter::successors(parent(assessment, sheet), |sheet| parent(assessment, sheet));
    above.flat_map(|sheet| &sheet.statements).find(|other| is_same(other, statement)).map(|other| other.label)
}

/// Every place where the name of that sheet stands, its own heading among them where `with_own` asks for it. Of a particular: the
/// lines that replace it in sheets that are like this one, and the headings of those that take it over.
pub fn references(assessment: &Assessment, file: FileId, offset: u32, with_own: bool) -> Vec<Place> {
    if let Some(wanted) = name_at(assessment, file, offset).map(|named| named.sheet.id) {
        let places = names(assessment).filter(|named| named.sheet.id == wanted && (with_own || !named.own));
        return places.map(|named| named.place).collect();
    }
    let Some((sheet, statement)) = stated_at(assessment, file, offset) else { return Vec::new() };
    let mut places = if with_own { vec![statement.label] } else { Vec::new() };
    let mut takers: Vec<&Sheet> = assessment.set.pointing_at(sheet.id, "like").collect();
    let mut at = 0;
    while let Some(taker) = takers.get(at) {
        match taker.statements.iter().find(|other| is_same(other, statement)) {
            Some(own) => places.push(own.label),
            None => {
                places.push(taker.name_place);
                takers.extend(assessment.set.pointing_at(taker.id, "like"));
            }
        }
        at += 1;
    }
    places
}

/// What is marked along with what an offset touches: the same name, or the same particular of any sheet of the file. Told with each
/// is whether it is the name's own heading.
pub fn highlights(assessment: &Assessment, file: FileId, offset: u32) -> Vec<(Span, bool)> {
    let here = |place: Place| Some(assessment.at(place)).filter(|at| at.file == file).map(|at| at.span);
    if let Some(wanted) = name_at(assessment, file, offset).map(|named| named.sheet.id) {
        let same = names(assessment).filter(|named| named.sheet.id == wanted);
        return same.filter_map(|named| Some((here(named.place)?, named.own))).collect();
    }
    let Some((_, statement)) = stated_at(assessment, file, offset) else { return Vec::new() };
    let same =
        sheets_of(assessment, file).flat_map(|sheet| &sheet.statements).filter(|other| is_same(other, statement));
    same.filter_map(|other| Some((here(other.label)?, false))).collect()
}

fn stated_at(assessment: &Assessment, file: FileId, offset: u32) -> Option<(&Sheet, &Statement)> {
    let sheet = sheet_at(assessment, file, offset)?;
    statement_at(assessment, sheet, offset).map(|(statement, _)| (sheet, statement))
}

fn parent<'a>(assessment: &'a Assessment, sheet: &Sheet) -> Option<&'a Sheet> {
    assessment.set.sheet(sheet.target("like")?)
}

fn is_same(a: &Statement, b: &Statement) -> bool {
    a.particular.is(b.particular) && a.about == b.about && a.limit == b.limit
}

#[cfg(test)]
mod tests {
    use firstpole_core::{Assessor, Sources};

    use super::*;
    use crate::features::testing::{BAY, assessed, bay_after, text_of};

    #[test]
    fn a_link_leads_to_the_heading() {
        let (assessment, at) = bay_after("LineBay on Ring");
        let place = definition(&assessment, FileId(0), at).expect("a place");
        assert_eq!(text_of(&assessment, assessment.span(place)), "Ring132");
        assert_eq!(assessment.span(place).start as usize, BAY.find("Ring132").expect("the heading"));
    }

    #[test]
    fn references_with_and_without_the_heading() {
        let (assessment, at) = bay_after("breaker Line");
        assert_eq!(references(&assessment, FileId(0), at, true).len(), 2);
        assert_eq!(references(&assessment, FileId(0), at, false).len(), 1);
        let text = BAY.to_owned() + "deviation from rated-voltage-not-preferred in LineBay\n";
        assert_eq!(references(&assessed(&text), FileId(0), at, true).len(), 3);
    }

    #[test]
    fn over_files() {
        let mut sources = Sources::of("bay.cbspec", "cbspec 1\nuse \"family.cbspec\"\nbreaker Bay like Big\n");
        let family = sources.add("family.cbspec", "cbspec 1\nfamily Big\n");
        let assessment = Assessor::standard().assess(&sources);
        let place = definition(&assessment, FileId(0), 49).expect("a place");
        assert_eq!(assessment.at(place).file, family);
        assert!(definition(&assessment, FileId(0), 0).is_none());
    }

    const FAMILY: &str = "cbspec 1\nfamily Big\n    Ur: 145 kV\nbreaker A like Big\nbreaker B like A\n    Ur: 123 kV\nbreaker C like B\n";

    fn at(text: &str) -> u32 {
        FAMILY.find(text).expect("there") as u32
    }

    #[test]
    fn a_particular_leads_to_what_it_replaces_and_to_who_takes_it_over() {
        let assessment = assessed(FAMILY);
        let place = definition(&assessment, FileId(0), at("Ur: 123")).expect("the family's line");
        assert_eq!(assessment.span(place).start, at("Ur: 145"));
        let places = references(&assessment, FileId(0), at("Ur: 145"), false);
        let starts: Vec<u32> = places.iter().map(|place| assessment.span(*place).start).collect();
        assert_eq!(starts, [at("A like"), at("Ur: 123")], "A takes it over, B replaces it, and C has it from B");
        assert!(definition(&assessment, FileId(0), at("Ur: 145")).is_none());
    }

    #[test]
    fn the_same_is_marked() {
        let assessment = assessed(FAMILY);
        let starts = |offset| -> Vec<(u32, bool)> {
            highlights(&assessment, FileId(0), offset).into_iter().map(|(span, own)| (span.start, own)).collect()
        };
        assert_eq!(starts(at("Ur: 145")), [(at("Ur: 145"), false), (at("Ur: 123"), false)]);
        assert_eq!(starts(at("Big\n")), [(at("Big\n"), true), (at("Big\nbreaker B"), false)]);
        assert!(starts(0).is_empty());
    }
}
