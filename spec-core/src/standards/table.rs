//! Reading a table.

use serde::de::DeserializeOwned;

/// The rows of a table. A row that cannot be read is left out, and a test fails: the tables are part of the program.
pub(super) fn rows<T: DeserializeOwned>(text: &'static str) -> Vec<T> {
    csv::Reader::from_reader(text.as_bytes()).into_deserialize().flatten().collect()
}

#[cfg(test)]
mod tests {
    /// Every row of every table has a source and a status, and none is lost in reading.
    #[test]
    fn every_row_has_a_source() {
        let tables = [
            ("voltages", include_str!("../../data/rated_voltages.csv"), super::super::rated_voltages().len()),
            ("insulation", include_str!("../../data/insulation_levels.csv"), super::super::insulation_levels().len()),
            ("trv", include_str!("../../data/trv_duties.csv"), super::super::trv_duties::all().len()),
            ("currents", include_str!("../../data/preferred_currents.csv"), super::super::currents::all().len()),
            (
                "time constants",
                include_str!("../../data/time_constants.csv"),
                super::super::time_constants::all().len(),
            ),
            ("gas law", include_str!("../../data/gas_law.csv"), super::super::gas_law::all().len()),
            ("making", include_str!("../../data/peak_factors.csv"), super::super::making::all().len()),
            ("S1 times", include_str!("../../data/trv_s1_times.csv"), super::super::trv_duties::s1_times()),
            ("durations", include_str!("../../data/durations.csv"), super::super::durations().count()),
            ("nominal voltages", include_str!("../../data/nominal_voltages.csv"), super::super::voltages::nominal()),
        ];
        for (name, text, read) in tables
            .into_iter()
            .chain(super::super::short_circuit::lengths())
            .chain(super::super::line_side::lengths())
            .chain(super::super::capacitive::lengths())
            .chain(super::super::surroundings::lengths())
            .chain(super::super::earthing::lengths())
        {
            let mut reader = csv::Reader::from_reader(text.as_bytes());
            let head = reader.headers().expect(name).clone();
            let column = |wanted: &str| head.iter().position(|h| h == wanted).expect(name);
            let (source, status) = (column("source"), column("status"));
            let mut count = 0;
            for row in reader.records() {
                let row = row.expect(name);
                assert!(row[source].len() > 5, "{name}: {row:?}");
                assert!(!row[status].is_empty(), "{name}: {row:?}");
                count += 1;
            }
            assert_eq!(count, read, "{name}: rows that could not be read");
        }
    }
}
