//! From a symbol's few shapes in millimetres to an SVG picture.
//!
//! The SVG keeps to what renderers agree on: a square `viewBox` from the origin, width and height without units,
//! plain paths and circles with their stroke and fill written out, no style sheet, no reuse, no text. Negative
//! origins and sizes in millimetres shift or clip the picture in some map servers.

use super::Symbol;
use std::fmt::Write;

/// Side of the square canvas in millimetres; exactly 50 pixels of 0.28 mm, the pixel that OGC styles assume.
pub const CANVAS_MM: f64 = 14.0;
/// SVG units in a millimetre.
pub const UNITS_PER_MM: f64 = 100.0;

/// A place on the canvas: millimetres to the right (east) and up (north) of the station.
pub type Point = (f64, f64);

/// One part of a symbol. Lengths are millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Shape {
    /// Straight strokes from point to point.
    Line {
        /// The points, in order.
        points: &'static [Point],
        /// Width of the stroke.
        width: f64,
    },
    /// An arc that runs counter-clockwise, as seen on the map, by half a turn.
    HalfCircle {
        /// Where it begins.
        from: Point,
        /// Where it ends.
        to: Point,
    },
    /// A closed stroke around an empty inside.
    Outline(&'static [Point]),
    /// A filled polygon without a stroke.
    Filled(&'static [Point]),
    /// A circle of which only the rim is drawn.
    Ring {
        /// Centre.
        centre: Point,
        /// Diameter, measured at the middle of the stroke.
        diameter: f64,
    },
    /// A filled circle.
    Ball {
        /// Centre.
        centre: Point,
        /// Diameter.
        diameter: f64,
    },
}

/// Stroke of every structure symbol unless its entry says otherwise, in millimetres.
pub(super) const STROKE: f64 = 0.2;

/// A number of SVG units, to a tenth.
fn units(mm: f64) -> f64 {
    (mm * UNITS_PER_MM * 10.0).round() / 10.0
}

/// "x y" in SVG units: x to the right, y down, origin at the top left corner.
fn at((right, up): Point) -> String {
    format!("{} {}", units(CANVAS_MM / 2.0 + right), units(CANVAS_MM / 2.0 - up))
}

fn path(points: &[Point], close: bool) -> String {
    let joined = points.iter().map(|&p| at(p)).collect::<Vec<_>>().join(" L ");
    format!("M {joined}{}", if close { " Z" } else { "" })
}

impl Shape {
    fn svg(&self, colour: &str) -> String {
        let stroked = |width: f64| format!("fill=\"none\" stroke=\"{colour}\" stroke-width=\"{}\"", units(width));
        let filled = format!("fill=\"{colour}\" stroke=\"none\"");
        let circle = |(right, up): Point, diameter: f64, paint: &str| {
            let (x, y) = (units(CANVAS_MM / 2.0 + right), units(CANVAS_MM / 2.0 - up));
            format!("<circle cx=\"{x}\" cy=\"{y}\" r=\"{}\" {paint}/>", units(diameter / 2.0))
        };
        match *self {
            Self::Line { points, width } => format!("<path d=\"{}\" {}/>", path(points, false), stroked(width)),
            Self::HalfCircle { from, to } => {
                let r = units((from.0 - to.0).hypot(from.1 - to.1) / 2.0);
                // Sweep flag 0: counter-clockwise on the screen, as on the map.
                format!("<path d=\"M {} A {r} {r} 0 0 0 {}\" {}/>", at(from), at(to), stroked(STROKE))
            }
            Self::Outline(points) => format!("<path d=\"{}\" {}/>", path(points, true), stroked(STROKE)),
            Self::Filled(points) => format!("<path d=\"{}\" {filled}/>", path(points, true)),
            Self::Ring { centre, diameter } => circle(centre, diameter, &stroked(STROKE)),
            Self::Ball { centre, diameter } => circle(centre, diameter, &filled),
        }
    }
}

/// The symbol as a black SVG picture, north-up, the station at its centre.
pub fn svg(symbol: &Symbol) -> String {
    svg_in(symbol, "#000000")
}

/// The same in a colour, written as `#rrggbb`.
pub fn svg_in(symbol: &Symbol, colour: &str) -> String {
    let side = units(CANVAS_MM);
    let mut out = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{side}\" height=\"{side}\" viewBox=\"0 0 {side} {side}\">\n"
    );
    for shape in symbol.drawing {
        // Writing to a String cannot fail.
        let _ = writeln!(out, "  {}", shape.svg(colour));
    }
    out.push_str("</svg>\n");
    out
}
