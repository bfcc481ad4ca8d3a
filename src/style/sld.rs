//! The orientations as an OGC Styled Layer Descriptor 1.0.0 for map servers.
//!
//! Written is what servers agree on: one rule per symbol code, an external picture with its size in pixels, no unit of
//! measure, anchor or displacement on the graphic. A pixel is 0.28 mm, as OGC styles assume, so 14 mm are 50.

use super::number::{POINTS, STRIKE_REACH};
use super::symbol_file;
use super::xml::{Element, element};
use crate::station::Kind;
use crate::symbol::{ALL, CANVAS_MM, Posture, Symbol};

/// Millimetres in a pixel, by the OGC's convention.
const PIXEL_MM: f64 = 0.28;
/// Millimetres in a point.
const POINT_MM: f64 = 25.4 / 72.0;
/// Between a symbol and its number.
const AIR_MM: f64 = 0.3;

/// Which way a renderer turns a graphic by a positive angle.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Turning {
    /// As the standard says.
    Clockwise,
    /// As some map servers do.
    CounterClockwise,
}

impl Turning {
    /// The field that holds the angle.
    pub fn field(self) -> &'static str {
        match self {
            Self::Clockwise => "rotation_grid",
            Self::CounterClockwise => "rotation_ccw",
        }
    }
}

/// The style of the layer `orientations`.
pub fn sld(turning: Turning) -> String {
    let whom = match turning {
        Turning::Clockwise => "For renderers that turn graphics clockwise, as the standard says.",
        Turning::CounterClockwise => {
            "For renderers that turn graphics counter-clockwise; otherwise the same as orientations.sld."
        }
    };
    let rules = ALL.iter().flat_map(|s| rules(s, turning));
    let style = element("UserStyle")
        .child(element("Name").text("orientations"))
        .child(element("Title").text("Orientations"))
        .child(element("FeatureTypeStyle").children(rules));
    element("StyledLayerDescriptor")
        .with("version", "1.0.0")
        .with("xmlns", "http://www.opengis.net/sld")
        .with("xmlns:ogc", "http://www.opengis.net/ogc")
        .with("xmlns:xlink", "http://www.w3.org/1999/xlink")
        .child(element("NamedLayer").child(element("Name").text("orientations")).child(style))
        .document(&format!("{whom} Draw the layer in its own CRS: the rotations hold for no other."))
}

/// Where the number goes: fixed for a whole rule, for a displacement that follows the rotation is not in the standard.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Number {
    None,
    Right,
    Left,
}

fn rules(symbol: &Symbol, turning: Turning) -> Vec<Element> {
    let is_code = comparison("ogc:PropertyIsEqualTo", "symbol", symbol.code);
    match (symbol.posture, symbol.kind) {
        // Right of the symbol a number is clear of the strike line whichever way that runs.
        (Posture::Inclined, Kind::Planar) => vec![rule(symbol, turning, "", is_code, Number::Right)],
        // An arrow leaves one side of the station free: two rules.
        (Posture::Inclined, Kind::Linear) => [
            (", to the east", "ogc:PropertyIsLessThan", Number::Left),
            (", to the west", "ogc:PropertyIsGreaterThanOrEqualTo", Number::Right),
        ]
        .map(|(suffix, compare, number)| {
            let half = comparison(compare, "rotation_grid", "180");
            rule(symbol, turning, suffix, element("ogc:And").child(is_code.clone()).child(half), number)
        })
        .into(),
        _ => vec![rule(symbol, turning, "", is_code, Number::None)],
    }
}

fn comparison(operator: &'static str, field: &str, value: &str) -> Element {
    element(operator).child(property(field)).child(element("ogc:Literal").text(value))
}

fn property(field: &str) -> Element {
    element("ogc:PropertyName").text(field)
}

fn rule(symbol: &Symbol, turning: Turning, suffix: &str, filter: Element, number: Number) -> Element {
    let picture = element("ExternalGraphic")
        .child(element("OnlineResource").with("xlink:type", "simple").with("xlink:href", symbol_file(symbol)))
        .child(element("Format").text("image/svg+xml"));
    let mut graphic = element("Graphic").child(picture).child(element("Size").text((CANVAS_MM / PIXEL_MM).round()));
    if symbol.turns() {
        graphic = graphic.child(element("Rotation").child(property(turning.field())));
    }
    let rule = element("Rule")
        .child(element("Name").text(format!("{}{}", symbol.code, suffix.replace(", to the ", "_"))))
        .child(element("Title").text(format!("{}{suffix}", symbol.marks)))
        .child(element("ogc:Filter").child(filter))
        .child(element("PointSymbolizer").child(graphic));
    match number {
        Number::None => rule,
        side => rule.child(text(symbol.kind, side)),
    }
}

/// The number, upright: a rotation would turn it with its displacement.
fn text(kind: Kind, side: Number) -> Element {
    let reach = match kind {
        Kind::Planar => STRIKE_REACH,
        Kind::Linear => 0.5,
    };
    let pixels = ((reach + AIR_MM) / PIXEL_MM).round();
    let (anchor, shift) = if side == Number::Left { (1.0, -pixels) } else { (0.0, pixels) };
    let css = |name: &str, value: String| element("CssParameter").with("name", name).text(value);
    let placement = element("PointPlacement")
        .child(
            element("AnchorPoint").child(element("AnchorPointX").text(anchor)).child(element("AnchorPointY").text(0.5)),
        )
        .child(
            element("Displacement").child(element("DisplacementX").text(shift)).child(element("DisplacementY").text(0)),
        );
    element("TextSymbolizer")
        .child(element("Label").child(property("label")))
        .child(
            element("Font")
                .child(css("font-family", "sans".into()))
                .child(css("font-size", (POINTS * POINT_MM / PIXEL_MM).round().to_string())),
        )
        .child(element("LabelPlacement").child(placement))
        .child(element("Fill").child(css("fill", "#000000".into())))
}
