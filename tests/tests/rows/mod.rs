//! The rows of a file of reference values, and a tally of what a test has asserted of it.

use std::collections::BTreeMap;

use firstpole_tests::root;

/// A row of a file, by the names of its columns.
pub struct Row(BTreeMap<String, String>, String);

impl Row {
    /// Which file and line it is.
    #[allow(dead_code, reason = "each test program takes what it needs of this module")]
    pub fn place(&self) -> &str {
        &self.1
    }

    /// The text in a column.
    pub fn text(&self, column: &str) -> &str {
        self.0.get(column).unwrap_or_else(|| panic!("{}: no column {column}", self.1))
    }

    /// The number in a column; none where the cell is empty.
    pub fn maybe(&self, column: &str) -> Option<f64> {
        let text = self.text(column);
        (!text.is_empty()).then(|| text.parse().unwrap_or_else(|_| panic!("{}: {column} is {text}", self.1)))
    }

    /// The number in a column that is never empty.
    pub fn number(&self, column: &str) -> f64 {
        self.maybe(column).unwrap_or_else(|| panic!("{}: {column} is empty", self.1))
    }

    /// Half a unit of the last digit printed in a column.
    pub fn rounding(&self, column: &str) -> f64 {
        half_of_last_digit(self.text(column))
    }

    /// Whether the row is kept for the record only.
    #[allow(dead_code, reason = "each test program takes what it needs of this module")]
    pub fn in_doubt(&self) -> bool {
        self.text("status").contains('D')
    }
}

/// Half a unit of the last digit of a printed number.
pub fn half_of_last_digit(text: &str) -> f64 {
    let decimals = text.split_once('.').map_or(0, |(_, digits)| digits.len());
    0.5 * 0.1f64.powf(decimals as f64)
}

/// The rows of a file of `tests/reference`.
pub fn rows(file: &str) -> Vec<Row> {
    let path = root().join("tests/reference").join(file);
    let mut reader = csv::Reader::from_path(path).unwrap_or_else(|fault| panic!("{file}: {fault}"));
    let all = reader.deserialize::<BTreeMap<String, String>>();
    all.enumerate()
        .map(|(at, row)| {
            let place = format!("{file}, line {}", at + 2);
            Row(row.unwrap_or_else(|fault| panic!("{place}: {fault}")), place)
        })
        .collect()
}

/// What a test has asserted of one file.
pub struct Tally {
    pub file: &'static str,
    pub asserted: usize,
    pub skipped: usize,
    faults: Vec<String>,
    largest: BTreeMap<String, f64>,
}

impl Tally {
    /// Of a file, with nothing asserted yet.
    pub fn of(file: &'static str) -> Self {
        Self { file, asserted: 0, skipped: 0, faults: Vec::new(), largest: BTreeMap::new() }
    }

    /// A condition that a row must meet.
    pub fn holds(&mut self, row: &Row, what: &str, condition: bool) {
        if !condition {
            self.faults.push(format!("{}: {what}", row.1));
        }
    }

    /// Whether `got` is `expected` to within `tolerance`; the largest error is kept by name, as a share of `scale`.
    pub fn near(&mut self, row: &Row, what: &str, got: f64, expected: f64, tolerance: f64, scale: f64) {
        let error = (got - expected).abs();
        let largest = self.largest.entry(what.to_owned()).or_default();
        *largest = largest.max(error / scale);
        // A little more than the tolerance, for a printed value that lies on the edge of its rounding.
        self.holds(row, &format!("{what} is {got}, published {expected}"), error <= tolerance * (1.0 + 1e-6));
    }

    /// The same for a printed value: within its rounding and a thousandth of a percent.
    pub fn printed(&mut self, row: &Row, column: &str, got: f64) {
        let expected = row.number(column);
        self.near(row, column, got, expected, row.rounding(column) + 1e-5 * expected.abs(), expected.abs());
    }

    /// Fails on a fault, and on any other number of rows asserted or skipped than the file has.
    #[expect(clippy::print_stdout, reason = "the count is for whoever runs the test")]
    pub fn end(self, asserted: usize, skipped: usize) {
        let largest: Vec<String> = self.largest.iter().map(|(what, error)| format!("{what} {error:.2e}")).collect();
        let summary = format!(
            "{}: {} rows asserted, {} skipped; largest errors: {}",
            self.file,
            self.asserted,
            self.skipped,
            largest.join(", ")
        );
        println!("{summary}");
        assert!(self.faults.is_empty(), "{summary}\n{}", self.faults.join("\n"));
        assert_eq!((self.asserted, self.skipped), (asserted, skipped), "{summary}");
    }
}
