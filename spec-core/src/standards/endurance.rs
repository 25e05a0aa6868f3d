//! Operations that the classes of mechanical endurance are tested for (IEC 62271-100).

use std::sync::LazyLock;

use serde::Deserialize;

use super::table;

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    grade: u8,
    operations: f64,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/mechanical_classes.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [Row] {
    &ROWS
}

/// The operations of class M with this number.
pub fn operations_of_class(grade: u8) -> Option<f64> {
    ROWS.iter().find(|row| row.grade == grade).map(|row| row.operations)
}

/// The lowest class M that covers so many operations.
pub fn class_for_operations(operations: f64) -> Option<u8> {
    ROWS.iter().find(|row| row.operations >= operations).map(|row| row.grade)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn two_classes() {
        assert_eq!(operations_of_class(1), Some(2000.0));
        assert_eq!(class_for_operations(2000.0), Some(1));
        assert_eq!(class_for_operations(2001.0), Some(2));
        assert_eq!(class_for_operations(10_001.0), None);
    }
}
