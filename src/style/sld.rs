//! The orientations as OGC Styled Layer Descriptors 1.0.0 for map servers.
//!
//! Written is what servers agree on: one rule per symbol code, an external picture with its size in pixels, no unit of
//! measure, anchor or displacement on the graphic. A pixel is 0.28 mm, as OGC styles assume, so 14 mm are 50.

use super::sld_numbers;
use super::symbol_file;
use super::xml::{Element, element};
use crate::symbol::{ALL, CANVAS_MM, Symbol};

/// Millimetres in a pixel, by the OGC's convention.
pub(super) const PIXEL_MM: f64 = 0.28;

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

/// The symbols of the layer `orientations`; for clockwise renderers with their numbers.
///
/// The renderers that turn counter-clockwise draw only the first rule that fits, so there the numbers are a
/// style of their own ([`sld_of_numbers`]), for a second layer over the first.
pub fn sld(turning: Turning) -> String {
    let symbols = ALL.iter().map(|s| rule(s, turning)).collect();
    match turning {
        Turning::Clockwise => document(
            "For renderers that turn graphics clockwise, as the standard says",
            vec![symbols, sld_numbers::rules(1.0)],
        ),
        Turning::CounterClockwise => document(
            "For renderers that turn graphics counter-clockwise; orientations_ccw_numbers.sld on a second layer adds \
             the dips and plunges",
            vec![symbols],
        ),
    }
}

/// The numbers of the layer `orientations` alone, for the renderers that turn counter-clockwise: they also count the
/// displacement of a label downwards (seen in MapServer 8.0), where the standard counts it upwards.
pub fn sld_of_numbers() -> String {
    let purpose = "Dips and plunges for a layer over orientations_ccw.sld; needs a font named sans. Displacements count \
                   downwards, as those renderers do";
    document(purpose, vec![sld_numbers::rules(-1.0)])
}

fn document(purpose: &str, styles: Vec<Vec<Element>>) -> String {
    let style = element("UserStyle")
        .child(element("Name").text("orientations"))
        .child(element("Title").text("Orientations"))
        .children(styles.into_iter().map(|rules| element("FeatureTypeStyle").children(rules)));
    element("StyledLayerDescriptor")
        .with("version", "1.0.0")
        .with("xmlns", "http://www.opengis.net/sld")
        .with("xmlns:ogc", "http://www.opengis.net/ogc")
        .with("xmlns:xlink", "http://www.w3.org/1999/xlink")
        .child(element("NamedLayer").child(element("Name").text("orientations")).child(style))
        .document(&format!("{purpose}. Draw the layer in its own CRS: the rotations hold for no other."))
}

pub(super) fn comparison(operator: &'static str, field: &str, value: impl ToString) -> Element {
    element(operator).child(property(field)).child(element("ogc:Literal").text(value))
}

pub(super) fn property(field: &str) -> Element {
    element("ogc:PropertyName").text(field)
}

fn rule(symbol: &Symbol, turning: Turning) -> Element {
    let picture = element("ExternalGraphic")
        .child(element("OnlineResource").with("xlink:type", "simple").with("xlink:href", symbol_file(symbol)))
        .child(element("Format").text("image/svg+xml"));
    let size = element("Size").text((CANVAS_MM / PIXEL_MM).round());
    let turn = symbol.turns().then(|| element("Rotation").child(property(turning.field())));
    element("Rule")
        .child(element("Name").text(symbol.code))
        .child(element("Title").text(symbol.marks))
        .child(element("ogc:Filter").child(comparison("ogc:PropertyIsEqualTo", "symbol", symbol.code)))
        .child(element("PointSymbolizer").child(element("Graphic").child(picture).child(size).children(turn)))
}
