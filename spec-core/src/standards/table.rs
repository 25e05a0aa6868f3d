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
            ("supply voltages", include_str!("../../data/supply_voltages.csv"), super::super::supply::counts().0),
            ("seismic", include_str!("../../data/seismic_levels.csv"), super::super::mechanical::counts().0),
            ("loads", include_str!("../../data/terminal_loads.csv"), super::super::mechanical::counts().1),
            ("zinc", include_str!("../../data/zinc_coatings.csv"), super::super::mechanical::counts().2),
            ("scopes", include_str!("../../data/standard_scopes.csv"), super::super::cited::counts().0),
            ("superseded", include_str!("../../data/superseded_standards.csv"), super::super::cited::counts().1),
            ("vocabulary", include_str!("../../data/edition_vocabulary.csv"), super::super::cited::counts().2),
            ("rating standards", include_str!("../../data/rating_standards.csv"), super::super::cited::counts().3),
            (
                "generator breakers",
                include_str!("../../data/generator_breaker_trv.csv"),
                super::super::generator_breaker::all().len(),
            ),
            ("endurance", include_str!("../../data/mechanical_classes.csv"), super::super::endurance::all().len()),
            (
                "usual currents",
                include_str!("../../data/usual_continuous_currents.csv"),
                super::super::currents::usual().len(),
            ),
            (
                "preferred numbers",
                include_str!("../../data/preferred_numbers.csv"),
                super::super::currents::preferred_numbers(),
            ),
            ("clearances", include_str!("../../data/clearances.csv"), super::super::clearances::all().len()),
            ("cooling", include_str!("../../data/altitude_cooling.csv"), super::super::cooling::all().len()),
            ("coil ranges", include_str!("../../data/coil_ranges.csv"), super::super::supply::counts().1),
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
