//! The dips and plunges of an SLD: upright, just beyond the dip mark or the arrow's tip.
//!
//! A displacement that follows the rotation is not in the standard, and a rotated label would stand on its head for half
//! of all strikes. So the circle is cut into sectors, one rule each, with a fixed displacement.

use super::number::{POINTS, distance};
use super::sld::{PIXEL_MM, comparison, property};
use super::xml::{Element, element};
use crate::orientation::wrap_degrees;
use crate::station::Kind;

/// Sectors of a full turn.
const SECTORS: u32 = 16;
/// Millimetres in a point.
const POINT_MM: f64 = 25.4 / 72.0;

/// One rule per kind and sector. Readings without a number (horizontal, vertical) have no label to draw.
/// `up` is 1 where a displacement's y counts upwards, as the standard says, and -1 where a renderer counts it downwards.
pub(super) fn rules(up: f64) -> Vec<Element> {
    [Kind::Planar, Kind::Linear].into_iter().flat_map(|kind| (0..SECTORS).map(move |k| rule(kind, k, up))).collect()
}

fn rule(kind: Kind, sector: u32, up: f64) -> Element {
    let width = 360.0 / f64::from(SECTORS);
    let towards = f64::from(sector) * width;
    // What a plane's number lies beside is its dip mark, 90 degrees right of the strike.
    let azimuth = match kind {
        Kind::Planar => towards - 90.0,
        Kind::Linear => towards,
    };
    let (from, to) = (wrap_degrees(azimuth - width / 2.0), wrap_degrees(azimuth + width / 2.0));
    // A sector across north is everything above its beginning or below its end.
    let within = element(if from < to { "ogc:And" } else { "ogc:Or" })
        .child(comparison("ogc:PropertyIsGreaterThanOrEqualTo", "rotation_grid", from))
        .child(comparison("ogc:PropertyIsLessThan", "rotation_grid", to));
    let filter = element("ogc:And").child(comparison("ogc:PropertyIsEqualTo", "kind", kind.word())).child(within);
    let pixels = distance(kind) / PIXEL_MM;
    let (x, y) = (pixels * towards.to_radians().sin(), up * pixels * towards.to_radians().cos());
    let css = |name: &str, value: String| element("CssParameter").with("name", name).text(value);
    let pair = |name: &'static str, x: (&'static str, f64), y: (&'static str, f64)| {
        element(name).child(element(x.0).text(x.1)).child(element(y.0).text(y.1))
    };
    // By its middle: for an edge as anchor, some servers read left for right and add the picture's own size.
    let placement = element("PointPlacement")
        .child(pair("AnchorPoint", ("AnchorPointX", 0.5), ("AnchorPointY", 0.5)))
        .child(pair("Displacement", ("DisplacementX", whole(x)), ("DisplacementY", whole(y))));
    let font = element("Font")
        .child(css("font-family", "sans".into()))
        .child(css("font-size", (POINTS * POINT_MM / PIXEL_MM).round().to_string()));
    let text = element("TextSymbolizer")
        .child(element("Label").child(property("label")))
        .child(font)
        .child(element("LabelPlacement").child(placement))
        .child(element("Fill").child(css("fill", "#000000".into())));
    element("Rule")
        .child(element("Name").text(format!("number_{}_{}", kind.word(), sector + 1)))
        .child(element("ogc:Filter").child(filter))
        .child(text)
}

/// Whole pixels; never a negative zero.
fn whole(pixels: f64) -> f64 {
    pixels.round() + 0.0
}
