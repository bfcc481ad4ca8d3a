//! Cells of separate columns: an azimuth, a dip, a dip quadrant, a rake.

use super::compass::{CompassPoint, compass_point};
use super::scan::{Token, blank_parted, cell_tokens};
use super::text::lettered;
use super::{NotationError, Quantity};

/// What an azimuth cell holds; the range is not checked yet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct AzimuthCell {
    /// Degrees as written.
    pub degrees: f64,
    /// Written with compass letters: either end of a strike line.
    pub letters: bool,
}

/// What a dip, plunge or rake cell holds; the range is not checked yet.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DipCell {
    /// Degrees as written.
    pub degrees: f64,
    /// Letters beside the number.
    pub side: Option<CompassPoint>,
}

/// A number the way most cells hold it.
fn quick(text: &str) -> Option<f64> {
    let text = text.trim();
    text.bytes().all(|b| b.is_ascii_digit() || b == b'.' || b == b'-').then(|| text.parse().ok()).flatten()
}

/// What a cell with neither digits nor letters of ours may still be: NaN, inf, 1e308.
fn machine_number(quantity: Quantity, text: &str) -> Result<f64, NotationError> {
    match text.trim().parse::<f64>() {
        Ok(v) if v.is_finite() => Ok(v),
        Ok(_) => Err(NotationError::NotFinite { quantity }),
        Err(_) => Err(NotationError::NotANumber { quantity, text: text.trim().to_owned() }),
    }
}

/// An azimuth as written in its own column: "045", "45,5", "45°30'", "45 30", "N45E", "E-W", "due N".
pub fn azimuth_cell(quantity: Quantity, text: &str) -> Result<AzimuthCell, NotationError> {
    if let Some(degrees) = quick(text) {
        return Ok(AzimuthCell { degrees, letters: false });
    }
    let Some(found) = cell_tokens(text) else {
        return machine_number(quantity, text).map(|degrees| AzimuthCell { degrees, letters: false });
    };
    let items = found.as_slice();
    match lettered(items) {
        Some(Ok((degrees, used))) if used == items.len() => return Ok(AzimuthCell { degrees, letters: true }),
        Some(_) => return Err(NotationError::QuadrantBearing(text.trim().to_owned())),
        None => {}
    }
    match blank_parted(items) {
        Some((num, used)) if used == items.len() => Ok(AzimuthCell { degrees: num.degrees, letters: false }),
        _ => machine_number(quantity, text).map(|degrees| AzimuthCell { degrees, letters: false }),
    }
}

/// A dip, plunge or rake as written in its own column: "45", "45°30'", "45 SE", "horizontal", "vertical".
pub fn dip_cell(quantity: Quantity, text: &str) -> Result<DipCell, NotationError> {
    if let Some(degrees) = quick(text) {
        return Ok(DipCell { degrees, side: None });
    }
    let other = || machine_number(quantity, text).map(|degrees| DipCell { degrees, side: None });
    let Some(found) = cell_tokens(text) else { return other() };
    match found.as_slice() {
        [Token::Horizontal] => Ok(DipCell { degrees: 0.0, side: None }),
        [Token::Vertical] => Ok(DipCell { degrees: 90.0, side: None }),
        items => match blank_parted(items) {
            Some((num, used)) => match items[used..] {
                [] => Ok(DipCell { degrees: num.degrees, side: None }),
                [Token::Point(p)] => Ok(DipCell { degrees: num.degrees, side: Some(p) }),
                _ => other(),
            },
            None => other(),
        },
    }
}

/// A rake as written: "30", "150", "30 NE" (acute, from the end named).
pub fn rake_cell(text: &str) -> Result<DipCell, NotationError> {
    dip_cell(Quantity::Rake, text)
}

/// A plain angle as written, no letters.
pub fn degrees_cell(quantity: Quantity, text: &str) -> Result<f64, NotationError> {
    let cell = dip_cell(quantity, text)?;
    match cell.side {
        None => Ok(cell.degrees),
        Some(_) => Err(NotationError::NotANumber { quantity, text: text.trim().to_owned() }),
    }
}

/// A dip quadrant as written: "NE", "se.", "South-East".
pub fn point_cell(text: &str) -> Result<CompassPoint, NotationError> {
    let text = text.trim();
    if let Some(point) = compass_point(text) {
        return Ok(point);
    }
    match cell_tokens(text).as_ref().map(|t| t.as_slice()) {
        Some([Token::Point(p)]) => Ok(*p),
        _ => Err(NotationError::CompassPoint(text.to_owned())),
    }
}
