//! Curves as SVG: recovery voltages, gas pressures, the decay of the DC component. The same duty gives the same bytes.

use plotters::prelude::*;

use crate::duty::{Duty, Level, Medium};
use crate::particular::{Particular, breaker, system};
use crate::physics::dc_component;
use crate::physics::trv::Envelope;
use crate::quantity::{Physical, ThermodynamicTemperature, Time, significant};
use crate::standards;

/// Pixels of a drawing.
const SIZE: (u32, u32) = (520, 320);

/// Points of a curve that is not straight.
const POINTS: usize = 60;

/// 0 degC in K.
const ICE: f64 = 273.15;

/// One curve, with what the legend says of it.
struct Curve {
    name: String,
    points: Vec<(f64, f64)>,
}

/// A line straight up, with what it marks.
struct Mark {
    name: String,
    at: f64,
}

/// The standard envelopes of the recovery voltage, and the rate of the network where it is known.
pub fn recovery_voltage(duty: &Duty) -> Option<String> {
    let mut curves: Vec<Curve> = [
        (standards::Duty::T100, "T100"),
        (standards::Duty::T60, "T60"),
        (standards::Duty::T30, "T30"),
        (standards::Duty::T10, "T10"),
    ]
    .into_iter()
    .filter_map(|(wanted, name)| {
        let (envelope, _) = duty.trv.envelope(wanted)?;
        Some(Curve { name: name.to_owned(), points: corners(envelope)? })
    })
    .collect();
    // Past the last peak nothing more happens.
    let end = curves.iter().filter_map(|curve| curve.points.last()).map(|(time, _)| time * 1.25).reduce(f64::max)?;
    for curve in &mut curves {
        let peak = curve.points.last()?.1;
        curve.points.push((end, peak));
    }
    if let (Some(rate), Some(peak)) = (&duty.network_trv.rate, &duty.network_trv.peak) {
        let (rate, peak) = (rate.value.si() / 1e9, peak.value.si() / 1e3);
        let points = vec![(0.0, 0.0), ((peak / rate).min(end), peak.min(rate * end)), (end, peak.min(rate * end))];
        curves.push(Curve { name: "network".to_owned(), points });
    }
    chart("recovery voltage", "time, us", "voltage, kV", &curves, &[])
}

/// From the origin to the peak, in us and kV.
fn corners(envelope: &Envelope) -> Option<Vec<(f64, f64)>> {
    let time = |time: Time| time.si() * 1e6;
    let peak = envelope.uc.si() / 1e3;
    let mut points = vec![(0.0, 0.0)];
    match (envelope.u1, envelope.t1, envelope.t2, envelope.t3) {
        (Some(u1), Some(t1), Some(t2), _) => points.extend([(time(t1), u1.si() / 1e3), (time(t2), peak)]),
        (_, _, _, Some(t3)) => points.push((time(t3), peak)),
        _ => return None,
    }
    Some(points)
}

/// The DC component of the network and of the rating, with the parting of the contacts.
pub fn dc_component(duty: &Duty) -> Option<String> {
    let mut curves = Vec::new();
    let all = [("network", &duty.time_constant), ("rating", &duty.rated_time_constant)];
    let longest = all.iter().filter_map(|(_, tau)| tau.as_ref()).map(|tau| tau.value.si()).reduce(f64::max)?;
    let end = (2.5 * longest).max(duty.separation.as_ref().map_or(0.0, |time| 1.5 * time.value.si()));
    for (name, tau) in all {
        let Some(tau) = tau else { continue };
        let point = |at: usize| {
            let time = end * at as f64 / POINTS as f64;
            (time * 1e3, 100.0 * dc_component::share(Time::from_si(time), tau.value).si())
        };
        curves.push(Curve { name: format!("{name}, {}", tau.value.show()), points: (0..=POINTS).map(point).collect() });
    }
    let parting = duty
        .separation
        .as_ref()
        .map(|time| Mark { name: format!("contacts part, {}", time.value.show()), at: time.value.si() * 1e3 });
    chart("DC component", "time from the fault, ms", "share, %", &curves, parting.as_slice())
}

/// The pressure of each level of a pure gas over temperature, its dew line, and the lowest temperature.
pub fn gas_pressure(duty: &Duty) -> Option<String> {
    let Some(Medium::Pure(gas)) = duty.gas.medium else { return None };
    let lowest = duty.gas.lowest.as_ref().map(|figure| figure.value.si());
    let coldest = duty
        .gas
        .levels
        .iter()
        .filter_map(|level| level.dew_point.as_ref())
        .map(|dew| dew.figure.value.si())
        .chain(lowest)
        .reduce(f64::min)?;
    let (from, to) = (coldest - 10.0, ICE + 40.0);
    let at = |step: usize| from + (to - from) * step as f64 / POINTS as f64;
    let celsius = |kelvin: f64| kelvin - ICE;
    let mut curves = Vec::new();
    let mut highest = 0.0_f64;
    for state in &duty.gas.levels {
        let Ok(density) = &state.density else { continue };
        // Below its dew point the pressure follows the dew line.
        let from_dew = state.dew_point.as_ref().map_or(from, |dew| dew.figure.value.si());
        let points: Vec<(f64, f64)> = std::iter::once(from_dew)
            .chain((0..=POINTS).map(at).filter(|kelvin| *kelvin > from_dew))
            .filter_map(|kelvin| {
                let pressure = gas.pressure(density.value, ThermodynamicTemperature::from_si(kelvin)).ok()?;
                Some((celsius(kelvin), pressure.si() / 1e6))
            })
            .collect();
        highest = points.iter().map(|(_, pressure)| *pressure).fold(highest, f64::max);
        let name = match state.level {
            Level::Filling => format!("filling, {}", state.written),
            Level::Alarm => format!("alarm, {}", state.written),
            Level::Minimum => format!("minimum, {}", state.written),
        };
        curves.push(Curve { name, points });
    }
    let dew: Vec<(f64, f64)> = (0..=POINTS)
        .map(at)
        .filter_map(|kelvin| {
            let pressure = gas.saturation_pressure(ThermodynamicTemperature::from_si(kelvin)).ok()?;
            Some((celsius(kelvin), pressure.si() / 1e6))
        })
        .take_while(|(_, pressure)| *pressure <= highest * 1.05)
        .collect();
    curves.push(Curve { name: "condenses above".to_owned(), points: dew });
    let mark = lowest.map(|kelvin| Mark { name: "lowest temperature".to_owned(), at: celsius(kelvin) });
    chart("gas pressure", "temperature, degC", "pressure, MPa abs", &curves, mark.as_slice())
}

/// Draws a duty; nothing where the text does not say enough for it.
pub type Drawing = fn(&Duty) -> Option<String>;

/// The drawing that belongs to a particular, with what it shows in words.
pub fn of_particular(particular: &Particular) -> Option<(&'static str, Drawing)> {
    let among = |all: &[&Particular]| all.iter().any(|one| one.is(particular));
    let of_envelope = ["T100 ", "T60 ", "T30 ", "T10 "].iter().any(|duty| particular.label.starts_with(duty));
    if of_envelope || among(&[&breaker::FIRST_POLE_TO_CLEAR_FACTOR]) {
        return Some(("envelopes of the recovery voltage", recovery_voltage));
    }
    if among(&[&breaker::DC_TIME_CONSTANT, &breaker::OPENING_TIME, &system::DC_TIME_CONSTANT, &system::X_OVER_R]) {
        return Some(("decay of the DC component", dc_component));
    }
    let pressures = [&breaker::RATED_FILLING_PRESSURE, &breaker::ALARM_PRESSURE, &breaker::MINIMUM_FUNCTIONAL_PRESSURE];
    among(&pressures).then_some(("pressure of the gas over temperature", gas_pressure))
}

/// Draws curves from the origin or the least value on; nothing where there is no curve.
fn chart(title: &str, x: &str, y: &str, curves: &[Curve], marks: &[Mark]) -> Option<String> {
    let all = || curves.iter().flat_map(|curve| curve.points.iter().copied());
    let xs = || all().map(|(x, _)| x).chain(marks.iter().map(|mark| mark.at));
    let (left, right) = (xs().reduce(f64::min)?, xs().reduce(f64::max)?);
    let top = all().map(|(_, y)| y).reduce(f64::max)? * 1.08;
    if !(right > left && top > 0.0) {
        return None;
    }
    let mut svg = String::new();
    // Where no curve is: a decay leaves the upper corner free, all others the lower.
    let falls = curves.first().and_then(|curve| Some(curve.points.last()?.1 < curve.points.first()?.1)) == Some(true);
    let legend = if falls { SeriesLabelPosition::UpperRight } else { SeriesLabelPosition::LowerRight };
    let drawn = draw(&mut svg, (title, x, y), (left..right, 0.0..top), curves, marks, legend);
    drawn.ok().map(|()| svg)
}

fn draw(
    svg: &mut String,
    (title, x, y): (&str, &str, &str),
    (across, up): (std::ops::Range<f64>, std::ops::Range<f64>),
    curves: &[Curve],
    marks: &[Mark],
    legend: SeriesLabelPosition,
) -> Result<(), Box<dyn std::error::Error>> {
    let area = SVGBackend::with_string(svg, SIZE).into_drawing_area();
    area.fill(&WHITE)?;
    let mut chart = ChartBuilder::on(&area)
        .caption(title, ("sans-serif", 15))
        .margin(10)
        .x_label_area_size(36)
        .y_label_area_size(52)
        .build_cartesian_2d(across, up.clone())?;
    chart
        .configure_mesh()
        .x_desc(x)
        .y_desc(y)
        .x_labels(8)
        .y_labels(7)
        .x_label_formatter(&|value| significant(*value, 4))
        .y_label_formatter(&|value| significant(*value, 4))
        .max_light_lines(0)
        .label_style(("sans-serif", 11))
        .axis_desc_style(("sans-serif", 12))
        .draw()?;
    for (at, curve) in curves.iter().enumerate() {
        let colour = COLOURS.get(at % COLOURS.len()).copied().unwrap_or(BLACK);
        chart
            .draw_series(LineSeries::new(curve.points.iter().copied(), colour.stroke_width(2)))?
            .label(curve.name.as_str())
            .legend(move |(x, y)| PathElement::new(vec![(x, y), (x + 16, y)], colour.stroke_width(2)));
    }
    for mark in marks {
        let grey = RGBColor(90, 90, 90);
        chart
            .draw_series(LineSeries::new([(mark.at, up.start), (mark.at, up.end)], grey.stroke_width(1)))?
            .label(mark.name.as_str())
            .legend(move |(x, y)| PathElement::new(vec![(x, y), (x + 16, y)], grey.stroke_width(1)));
    }
    chart
        .configure_series_labels()
        .position(legend)
        .background_style(WHITE.mix(0.85))
        .border_style(RGBColor(170, 170, 170))
        .label_font(("sans-serif", 11))
        .draw()?;
    area.present()?;
    Ok(())
}

/// Colours that are told apart also by those who see red and green alike.
const COLOURS: [RGBColor; 5] =
    [RGBColor(0, 90, 160), RGBColor(200, 80, 0), RGBColor(0, 130, 100), RGBColor(150, 60, 130), RGBColor(60, 60, 60)];

#[cfg(test)]
mod tests {
    use super::*;
    use crate::case::Case;
    use crate::rules::Policy;
    use crate::{Assessor, Sources};

    const BAY: &str = "cbspec 1\nsystem Ring\n    highest voltage: 145 kV\n    frequency: 50 Hz\n    neutral: effectively earthed\n    \
                       short-circuit current: 28.4 kA\n    X/R: 21\nsite Yard\n    installation: outdoor\n    lowest ambient: -42 degC\n\
                       breaker Bay on Ring at Yard\n    rated voltage: 145 kV\n    Isc: 31.5 kA\n    DC time constant: 45 ms\n    \
                       opening time: 30 ms\n    kpp: 1.3\n    insulating gas: SF6\n    rated filling pressure: 0.70 MPa abs\n    \
                       alarm pressure: 0.64 MPa abs\n    minimum functional pressure: 0.61 MPa abs\n";

    fn drawn(text: &str, draw: impl Fn(&Duty) -> Option<String>) -> Option<String> {
        let assessment = Assessor::standard().assess(&Sources::of("bay", text));
        let sheet = assessment.set.of_kind(crate::particular::SheetKind::Breaker).next().expect("a breaker");
        let policy = Policy::default();
        draw(&Case::new(&assessment.set, sheet, &policy).duty)
    }

    #[test]
    fn curves_say_what_they_show() {
        for (draw, said) in [
            (
                recovery_voltage as fn(&Duty) -> Option<String>,
                &["T100", "T60", "T30", "T10", "time, us", "voltage, kV"][..],
            ),
            (dc_component, &["network, 66.8 ms", "rating, 45 ms", "contacts part, 40 ms", "share, %"]),
            (gas_pressure, &["filling, 0.70 MPa abs", "alarm", "minimum", "condenses above", "lowest temperature"]),
        ] {
            let svg = drawn(BAY, draw).expect("a drawing");
            assert_eq!(drawn(BAY, draw).as_ref(), Some(&svg), "the same each time");
            assert!(svg.starts_with("<svg") && svg.trim_end().ends_with("</svg>"), "{svg}");
            assert!(svg.len() < 20_000, "{}", svg.len());
            for word in said {
                assert!(svg.contains(word), "{word} is missing in {svg}");
            }
        }
    }

    #[test]
    fn what_is_not_known_is_not_drawn() {
        let bare = "cbspec 1\nbreaker Bay\n    rated voltage: 145 kV\n";
        assert!(drawn(bare, recovery_voltage).is_none());
        assert!(drawn(bare, gas_pressure).is_none());
        let only_rating = drawn(bare, dc_component);
        assert!(only_rating.is_none_or(|svg| !svg.contains("network")));
    }
}
