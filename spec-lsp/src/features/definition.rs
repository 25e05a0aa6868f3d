//! Where a sheet is defined, and where its name stands.

use firstpole_core::{Assessment, FileId, Place};

use super::spot::{name_at, names};

/// Where the sheet is defined whose name an offset touches.
pub fn definition(assessment: &Assessment, file: FileId, offset: u32) -> Option<Place> {
    name_at(assessment, file, offset).map(|named| named.sheet.name_place)
}

/// Every place where the name of that sheet stands, its own heading among them where `with_own` asks for it.
pub fn references(assessment: &Assessment, file: FileId, offset: u32, with_own: bool) -> Vec<Place> {
    let Some(wanted) = name_at(assessment, file, offset).map(|named| named.sheet.id) else { return Vec::new() };
    names(assessment)
        .filter(|named| named.sheet.id == wanted && (with_own || !named.own))
        .map(|named| named.place)
        .collect()
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
}
