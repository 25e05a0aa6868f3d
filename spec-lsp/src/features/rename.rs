//! Another name for a sheet, wherever it stands.

use firstpole_core::particular::SheetKind;
use firstpole_core::sheet::{Sheet, SheetId};
use firstpole_core::{Assessment, FileId, Place, Span};

use super::actions::written;
use super::spot::{name_at, names};

/// The name that an offset touches, as it stands there, quotes included, and without them.
pub fn name_to_change(assessment: &Assessment, file: FileId, offset: u32) -> Option<(Span, String)> {
    let named = name_at(assessment, file, offset)?;
    // A tender has a title, to which nothing refers.
    (named.sheet.kind != SheetKind::Tender).then(|| (assessment.span(named.place), named.sheet.name.clone()))
}

/// The sheet whose name an offset touches.
pub fn sheet_to_change(assessment: &Assessment, file: FileId, offset: u32) -> Option<&Sheet> {
    name_at(assessment, file, offset).map(|named| named.sheet).filter(|sheet| sheet.kind != SheetKind::Tender)
}

/// The sheet of this kind and name in a file.
pub fn same_sheet<'a>(assessment: &'a Assessment, file: &str, kind: SheetKind, name: &str) -> Option<&'a Sheet> {
    let file = assessment.sources.find(file)?;
    assessment.set.sheets().find(|sheet| sheet.file() == file && sheet.kind == kind && sheet.name == name)
}

/// Where the name of a sheet stands, and what is written there then; or why it cannot be called so.
pub fn renamed(assessment: &Assessment, sheet: SheetId, name: &str) -> Result<(Vec<Place>, String), String> {
    let sheet = assessment.set.sheet(sheet).ok_or("there is no such sheet any more")?;
    let name = name.trim().trim_matches('"');
    if name.chars().any(|c| c.is_control() || c == '"') {
        return Err("a name holds no quotes and no line breaks".to_owned());
    }
    let text = written(name).ok_or("a name is needed")?;
    let shares = |other: &&Sheet| {
        let breaker = |kind| matches!(kind, SheetKind::Breaker | SheetKind::Family);
        other.kind == sheet.kind || breaker(other.kind) && breaker(sheet.kind)
    };
    let mut others = assessment.set.sheets().filter(|other| other.id != sheet.id && other.file() == sheet.file());
    if let Some(other) = others.find(|other| shares(other) && other.name == name) {
        return Err(format!("there is a {} already", other.title()));
    }
    let places = names(assessment).filter(|named| named.sheet.id == sheet.id).map(|named| named.place);
    Ok((places.collect(), text))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, bay_after};

    #[test]
    fn every_place_is_found() {
        let (assessment, at) = bay_after("breaker Line");
        let sheet = sheet_to_change(&assessment, FileId(0), at).expect("a sheet").id;
        let (places, text) = renamed(&assessment, sheet, "Bay 7").expect("a name");
        assert_eq!((places.len(), text.as_str()), (2, "\"Bay 7\""));
        assert!(places.iter().all(|place| assessment.sources.text(*place) == "LineBay"));
        let (span, name) = name_to_change(&assessment, FileId(0), at).expect("a name");
        assert_eq!((span.of(BAY), name.as_str()), ("LineBay", "LineBay"));
    }

    #[test]
    fn what_cannot_be_a_name_is_refused() {
        let (assessment, at) = bay_after("system Ring");
        let sheet = sheet_to_change(&assessment, FileId(0), at).expect("a sheet").id;
        for (name, why) in [("", "a name is needed"), ("a\nb", "no line breaks"), ("a\"b", "no quotes")] {
            let refused = renamed(&assessment, sheet, name).expect_err("refused");
            assert!(refused.contains(why), "{refused}");
        }
        let text = BAY.to_owned() + "system Other\n";
        let assessment = crate::features::testing::assessed(&text);
        let sheet = sheet_to_change(&assessment, FileId(0), at).expect("a sheet").id;
        assert_eq!(renamed(&assessment, sheet, "Other").expect_err("refused"), "there is a system Other already");
        assert!(renamed(&assessment, sheet, "LineBay").is_ok(), "names of other kinds do not clash");
    }

    #[test]
    fn nothing_else_has_a_name() {
        let (assessment, at) = bay_after("rated volt");
        assert!(name_to_change(&assessment, FileId(0), at).is_none());
    }
}
