//! Attitudes in print, in forms that [`super::attitude`] reads back.

use super::Notation;
use crate::orientation::{Measured, wrap_degrees};
use std::fmt;

/// An attitude to be printed in a notation.
///
/// Right- and left-hand "045/30", dip direction "135->30", quadrant "N45E 30SE"; a horizontal plane without a strike
/// is "horizontal", a line is "045/30" in every notation. Azimuths have three digits, angles up to nine decimals.
/// [`Notation::Auto`] and, for a plane, [`Notation::TrendPlunge`] print the right-hand form.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Printed {
    /// What to print.
    pub measured: Measured,
    /// How.
    pub notation: Notation,
}

/// `degrees` with up to nine decimals and at least `width` digits before them.
fn degrees(f: &mut fmt::Formatter<'_>, degrees: f64, width: usize) -> fmt::Result {
    let text = format!("{degrees:0width$.9}", width = width + 10);
    f.write_str(text.trim_end_matches('0').trim_end_matches('.'))
}

/// An azimuth; what rounds up to a full turn is north.
fn azimuth(f: &mut fmt::Formatter<'_>, value: f64) -> fmt::Result {
    let value = wrap_degrees(value);
    degrees(f, if value > 360.0 - 5e-10 { 0.0 } else { value }, 3)
}

fn bearing(f: &mut fmt::Formatter<'_>, value: f64) -> fmt::Result {
    let value = wrap_degrees(value);
    let (from, angle, toward) = match value {
        v if v <= 90.0 => ('N', v, 'E'),
        v if v <= 180.0 => ('S', 180.0 - v, 'E'),
        v if v <= 270.0 => ('S', v - 180.0, 'W'),
        v => ('N', 360.0 - v, 'W'),
    };
    write!(f, "{from}")?;
    degrees(f, angle, 1)?;
    write!(f, "{toward}")
}

/// The letters of the side that lies along `azimuth`: a cardinal point where it is one, else a quadrant.
fn side(azimuth: f64) -> &'static str {
    let azimuth = wrap_degrees(azimuth);
    let names = ["N", "NE", "E", "SE", "S", "SW", "W", "NW"];
    let quarter = (azimuth / 90.0) as usize % 4;
    names[quarter * 2 + usize::from(azimuth % 90.0 != 0.0)]
}

impl fmt::Display for Printed {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.measured {
            Measured::Line { trend, plunge } => {
                azimuth(f, trend.degrees())?;
                f.write_str("/")?;
                degrees(f, plunge.degrees(), 2)
            }
            Measured::Plane { strike: None, .. } => f.write_str("horizontal"),
            Measured::Plane { strike: Some(strike), dip } => {
                let strike = strike.degrees();
                match self.notation {
                    Notation::Quadrant => {
                        bearing(f, strike)?;
                        f.write_str(" ")?;
                        degrees(f, dip.degrees(), 1)?;
                        f.write_str(side(strike + 90.0))
                    }
                    Notation::DipDirection => {
                        azimuth(f, strike + 90.0)?;
                        f.write_str("->")?;
                        degrees(f, dip.degrees(), 2)
                    }
                    other => {
                        azimuth(f, if other == Notation::LeftHand { strike + 180.0 } else { strike })?;
                        f.write_str("/")?;
                        degrees(f, dip.degrees(), 2)
                    }
                }
            }
        }
    }
}

/// A number for a message: as people write it, without the 300 digits of 1e300, and never "-0".
pub fn shown(value: f64) -> String {
    match value.abs() {
        0.0 => "0".to_owned(),
        size if size.is_finite() && !(1e-6..1e15).contains(&size) => format!("{value:e}"),
        _ => value.to_string(),
    }
}
