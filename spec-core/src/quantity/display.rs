//! Numbers as a reader wants them: few digits, no trailing noise.

/// `value` with `digits` significant digits, without trailing zeros after the point and without an exponent.
///
/// ```
/// use firstpole_core::quantity::significant;
/// assert_eq!(significant(66.8451, 3), "66.8");
/// assert_eq!(significant(1425.0, 3), "1425");
/// assert_eq!(significant(0.30, 3), "0.3");
/// ```
pub fn significant(value: f64, digits: u8) -> String {
    if value == 0.0 || !value.is_finite() {
        return if value == 0.0 { "0".to_owned() } else { value.to_string() };
    }
    let magnitude = value.abs().log10().floor() as i32;
    let decimals = (i32::from(digits) - 1 - magnitude).max(0) as usize;
    let text = format!("{value:.decimals$}");
    trimmed(text)
}

/// `value` with `decimals` digits after the point, without trailing zeros.
pub fn rounded(value: f64, decimals: usize) -> String {
    trimmed(format!("{value:.decimals$}"))
}

fn trimmed(text: String) -> String {
    let short = if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.') } else { &text };
    if short == "-0" { "0".to_owned() } else { short.to_owned() }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn digits_follow_the_size_of_the_number() {
        assert_eq!(significant(617.43, 3), "617");
        assert_eq!(significant(36.0, 3), "36");
        assert_eq!(significant(-28.62, 3), "-28.6");
        assert_eq!(significant(0.004_25, 3), "0.00425");
        assert_eq!(significant(0.0, 3), "0");
        assert_eq!(significant(123_456.0, 3), "123456");
    }

    #[test]
    fn no_negative_zero() {
        assert_eq!(rounded(-0.001, 1), "0");
    }
}
