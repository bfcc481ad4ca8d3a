//! The catalogue itself: one entry per symbol.
//!
//! Numbers marked [`Evidence::Stated`] are given with their type of structure by a type list that the USGS publishes
//! with its GeMS standard. Those marked [`Evidence::Measured`] were found, and their drawing measured, in one public
//! implementation of FGDC-STD-013-2006; what they mark is recalled from the standard, whose page drawings were not
//! at hand. For a vein, dike, contact or axial plane observed at a point no number could be confirmed: they get the
//! neutral symbols, and the field `structure` says what they are. The standard allows other sizes where symbols stay distinguishable and are explained.

use super::drawing::STROKE;
use super::{Posture, Shape, fallback};
use crate::orientation::Polarity;
use crate::station::Kind;

/// Which part of the drawing stands on the station.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Anchor {
    /// The middle of the strike line, of the circle, of the cross.
    Middle,
    /// The tail of the arrow.
    Tail,
}

/// How well a code and its drawing are known.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Evidence {
    /// Number and type stand in a USGS type list; drawing measured from one public implementation.
    Stated,
    /// Number and drawing measured from one public implementation; what it marks is from memory.
    Measured,
    /// This project's own symbol; not in the standard.
    Own,
}

impl Evidence {
    /// The same in words.
    pub fn sentence(self) -> &'static str {
        match self {
            Self::Stated => {
                "number and type stated by a USGS type list; drawing measured from one public implementation"
            }
            Self::Measured => "number and drawing measured from one public implementation; wording from memory",
            Self::Own => "this project's own symbol, not part of FGDC-STD-013-2006",
        }
    }
}

/// One symbol.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Symbol {
    /// Number in FGDC-STD-013-2006, zero-padded; a word for this project's own symbols.
    pub code: &'static str,
    /// What it marks.
    pub marks: &'static str,
    /// When [`super::choose`] takes it.
    pub chosen_when: &'static str,
    /// Planar or linear.
    pub kind: Kind,
    /// How steep the structure is.
    pub posture: Posture,
    /// The structures it is chosen for; empty for neutral symbols and for those only a user sets by hand.
    pub structures: &'static [&'static str],
    /// The polarity it is chosen for; `None` where polarity does not matter.
    pub polarity: Option<Polarity>,
    /// How well it is known.
    pub evidence: Evidence,
    /// What more there is to doubt about it; empty where nothing is.
    pub doubt: &'static str,
    /// Its shapes in millimetres, north-up, the station at (0, 0).
    pub drawing: &'static [Shape],
}

impl Symbol {
    /// Which part of the drawing stands on the station.
    pub fn anchor(&self) -> Anchor {
        match (self.kind, self.posture) {
            (Kind::Linear, Posture::Inclined) => Anchor::Tail,
            _ => Anchor::Middle,
        }
    }
    /// Whether the symbol is turned to an azimuth. A horizontal plane has no strike and a vertical line no trend,
    /// whatever a source says: their symbols stay upright and the rotation written beside them is not used.
    pub fn turns(&self) -> bool {
        !matches!((self.kind, self.posture), (Kind::Planar, Posture::Horizontal) | (Kind::Linear, Posture::Vertical))
    }
    pub(super) fn is_fallback(&self) -> bool {
        self.evidence == Evidence::Own
    }
    pub(super) fn suits(&self, structure: &str, kind: Kind, posture: Posture, polarity: Polarity) -> bool {
        self.kind == kind
            && self.posture == posture
            && self.structures.contains(&structure)
            && self.polarity.is_none_or(|p| p == polarity)
    }
}

const STRIKE: Shape = line(&[(0.0, -2.5), (0.0, 2.5)]);
const TICK: Shape = line(&[(0.0, 0.0), (1.0, 0.0)]);
const OVERTURNED: Shape = Shape::HalfCircle { from: (0.0, 0.625), to: (0.0, -0.625) };
const TOPS: Shape = Shape::Ball { centre: (0.0, 2.5), diameter: 0.7 };
const CIRCLE: Shape = Shape::Ring { centre: (0.0, 0.0), diameter: 2.5 };
const SHAFT: Shape = line(&[(0.0, 0.0), (0.0, 4.5)]);
const HEAD: Shape = Shape::Filled(&[(-0.67, 4.5), (0.67, 4.5), (0.0, 6.0)]);
const TRIANGLE: &[(f64, f64)] = &[(0.0, -0.67), (0.0, 0.67), (1.2, 0.0)];
const DIAMOND: &[(f64, f64)] = &[(0.0, -0.67), (1.2, 0.0), (0.0, 0.67), (-1.2, 0.0)];
const SMALL_DIAMOND: &[(f64, f64)] = &[(0.0, -0.67), (0.67, 0.0), (0.0, 0.67), (-0.67, 0.0)];

const fn line(points: &'static [(f64, f64)]) -> Shape {
    Shape::Line { points, width: STROKE }
}

const PLANE: Symbol = Symbol {
    code: "",
    marks: "",
    chosen_when: "",
    kind: Kind::Planar,
    posture: Posture::Inclined,
    structures: &[],
    polarity: None,
    evidence: Evidence::Stated,
    doubt: "",
    drawing: &[],
};
const FLAT: Symbol = Symbol { posture: Posture::Horizontal, ..PLANE };
const STEEP: Symbol = Symbol { posture: Posture::Vertical, ..PLANE };
const LINE: Symbol = Symbol { kind: Kind::Linear, ..PLANE };
const FLAT_LINE: Symbol = Symbol { posture: Posture::Horizontal, ..LINE };
const STEEP_LINE: Symbol = Symbol { posture: Posture::Vertical, ..LINE };

/// The catalogue, sorted by code, this project's own symbols last.
pub static ALL: &[Symbol] = &[
    Symbol {
        code: "02.15.01",
        marks: "minor fault, inclined",
        chosen_when: "structure fault, dip between horizontal and vertical",
        structures: &["fault"],
        evidence: Evidence::Measured,
        drawing: &[Shape::Line { points: &[(0.0, -5.0), (0.0, 5.0)], width: 0.38 }, line(&[(0.0, 0.0), (1.25, 0.0)])],
        ..PLANE
    },
    Symbol {
        code: "02.15.02",
        marks: "minor fault, vertical",
        chosen_when: "structure fault, dip rounds to 90",
        structures: &["fault"],
        evidence: Evidence::Measured,
        drawing: &[Shape::Line { points: &[(0.0, -5.0), (0.0, 5.0)], width: 0.38 }, line(&[(-1.25, 0.0), (1.25, 0.0)])],
        ..STEEP
    },
    Symbol {
        code: "04.03.01",
        marks: "joint, horizontal",
        chosen_when: "structure joint, dip rounds to 0",
        structures: &["joint"],
        evidence: Evidence::Measured,
        doubt: "the size of the square inside the circle is ours",
        drawing: &[CIRCLE, Shape::Filled(&[(-0.5, -0.5), (0.5, -0.5), (0.5, 0.5), (-0.5, 0.5)])],
        ..FLAT
    },
    Symbol {
        code: "04.03.02",
        marks: "joint, inclined",
        chosen_when: "structure joint, dip between horizontal and vertical",
        structures: &["joint"],
        drawing: &[STRIKE, Shape::Filled(&[(0.0, -0.675), (0.57, -0.675), (0.57, 0.675), (0.0, 0.675)])],
        ..PLANE
    },
    Symbol {
        code: "04.03.03",
        marks: "joint, vertical",
        chosen_when: "structure joint, dip rounds to 90",
        structures: &["joint"],
        drawing: &[STRIKE, Shape::Filled(&[(-0.665, -0.665), (0.665, -0.665), (0.665, 0.665), (-0.665, 0.665)])],
        ..STEEP
    },
    Symbol {
        code: "06.01",
        marks: "bedding, horizontal",
        chosen_when: "structure bedding, dip rounds to 0",
        structures: &["bedding"],
        drawing: &[CIRCLE, line(&[(-1.25, 0.0), (1.25, 0.0)]), line(&[(0.0, -1.25), (0.0, 1.25)])],
        ..FLAT
    },
    Symbol {
        code: "06.02",
        marks: "bedding, inclined",
        chosen_when: "structure bedding, dip between horizontal and vertical, polarity unknown",
        structures: &["bedding"],
        polarity: Some(Polarity::Unknown),
        drawing: &[STRIKE, TICK],
        ..PLANE
    },
    Symbol {
        code: "06.03",
        marks: "bedding, vertical",
        chosen_when: "structure bedding, dip rounds to 90, whatever the polarity",
        structures: &["bedding"],
        drawing: &[STRIKE, line(&[(-1.0, 0.0), (1.0, 0.0)])],
        ..STEEP
    },
    Symbol {
        code: "06.04",
        marks: "bedding, overturned",
        chosen_when: "never by the program, which takes a stated polarity as seen on the outcrop (06.15); for setting by hand",
        evidence: Evidence::Measured,
        drawing: &[STRIKE, TICK, OVERTURNED],
        ..PLANE
    },
    Symbol {
        code: "06.13",
        marks: "bedding, inclined, tops known: upright",
        chosen_when: "structure bedding, dip between horizontal and vertical, polarity upright",
        structures: &["bedding"],
        polarity: Some(Polarity::Upright),
        doubt: "at which end of the strike line the ball belongs is not confirmed",
        drawing: &[STRIKE, TICK, TOPS],
        ..PLANE
    },
    Symbol {
        code: "06.15",
        marks: "bedding, overturned, tops known",
        chosen_when: "structure bedding, dip between horizontal and vertical, polarity overturned",
        structures: &["bedding"],
        polarity: Some(Polarity::Overturned),
        doubt: "at which end of the strike line the ball belongs is not confirmed",
        drawing: &[STRIKE, TICK, OVERTURNED, TOPS],
        ..PLANE
    },
    Symbol {
        code: "07.01",
        marks: "cleavage, horizontal",
        chosen_when: "structure cleavage, dip rounds to 0",
        structures: &["cleavage"],
        evidence: Evidence::Measured,
        doubt: "the length of the end bars is ours",
        drawing: &[
            line(&[(-2.0, 0.0), (2.0, 0.0)]),
            line(&[(0.0, -2.0), (0.0, 2.0)]),
            line(&[(-2.0, -0.5), (-2.0, 0.5)]),
            line(&[(2.0, -0.5), (2.0, 0.5)]),
            line(&[(-0.5, -2.0), (0.5, -2.0)]),
            line(&[(-0.5, 2.0), (0.5, 2.0)]),
        ],
        ..FLAT
    },
    Symbol {
        code: "07.02",
        marks: "cleavage, inclined",
        chosen_when: "structure cleavage, dip between horizontal and vertical",
        structures: &["cleavage"],
        drawing: &[line(&[(1.0, -2.5), (0.0, -2.5), (0.0, 2.5), (1.0, 2.5)])],
        ..PLANE
    },
    Symbol {
        code: "07.03",
        marks: "cleavage, vertical",
        chosen_when: "structure cleavage, dip rounds to 90",
        structures: &["cleavage"],
        evidence: Evidence::Measured,
        drawing: &[STRIKE, line(&[(-0.725, -2.5), (0.725, -2.5)]), line(&[(-0.725, 2.5), (0.725, 2.5)])],
        ..STEEP
    },
    Symbol {
        code: "08.02.02",
        marks: "igneous foliation, horizontal",
        chosen_when: "structure igneous_foliation, dip rounds to 0",
        structures: &["igneous_foliation"],
        evidence: Evidence::Measured,
        doubt: "the size of the diamond inside the circle is ours",
        drawing: &[CIRCLE, Shape::Outline(SMALL_DIAMOND)],
        ..FLAT
    },
    Symbol {
        code: "08.02.03",
        marks: "igneous foliation, inclined",
        chosen_when: "structure igneous_foliation, dip between horizontal and vertical",
        structures: &["igneous_foliation"],
        drawing: &[STRIKE, Shape::Outline(TRIANGLE)],
        ..PLANE
    },
    Symbol {
        code: "08.02.04",
        marks: "igneous foliation, vertical",
        chosen_when: "structure igneous_foliation, dip rounds to 90",
        structures: &["igneous_foliation"],
        evidence: Evidence::Measured,
        doubt: "the width of the diamond (the two triangles back to back) is ours",
        drawing: &[STRIKE, Shape::Outline(DIAMOND)],
        ..STEEP
    },
    Symbol {
        code: "08.03.01",
        marks: "metamorphic or tectonic foliation, horizontal",
        chosen_when: "structure foliation, dip rounds to 0",
        structures: &["foliation"],
        evidence: Evidence::Measured,
        doubt: "the size of the diamond inside the circle is ours",
        drawing: &[CIRCLE, Shape::Filled(SMALL_DIAMOND)],
        ..FLAT
    },
    Symbol {
        code: "08.03.02",
        marks: "metamorphic or tectonic foliation, inclined",
        chosen_when: "structure foliation, dip between horizontal and vertical",
        structures: &["foliation"],
        drawing: &[STRIKE, Shape::Filled(TRIANGLE)],
        ..PLANE
    },
    Symbol {
        code: "08.03.03",
        marks: "metamorphic or tectonic foliation, vertical",
        chosen_when: "structure foliation, dip rounds to 90",
        structures: &["foliation"],
        evidence: Evidence::Measured,
        doubt: "the width of the diamond (the two triangles back to back) is ours",
        drawing: &[STRIKE, Shape::Filled(DIAMOND)],
        ..STEEP
    },
    Symbol {
        code: "09.001",
        marks: "lineation, inclined",
        chosen_when: "structure lineation or intersection_lineation, plunge between horizontal and vertical",
        structures: &["lineation", "intersection_lineation"],
        doubt: "stands for every kind of lineation whose own number is not confirmed",
        drawing: &[SHAFT, HEAD],
        ..LINE
    },
    Symbol {
        code: "09.005",
        marks: "lineation, horizontal",
        chosen_when: "structure lineation, intersection_lineation or fold_axis, plunge rounds to 0",
        structures: &["lineation", "intersection_lineation", "fold_axis"],
        evidence: Evidence::Measured,
        doubt: "stands for every kind of lineation whose own number is not confirmed",
        drawing: &[
            line(&[(0.0, -1.5), (0.0, 1.5)]),
            Shape::Filled(&[(-0.67, 1.5), (0.67, 1.5), (0.0, 3.0)]),
            Shape::Filled(&[(-0.67, -1.5), (0.67, -1.5), (0.0, -3.0)]),
        ],
        ..FLAT_LINE
    },
    Symbol {
        code: "09.007",
        marks: "lineation, vertical",
        chosen_when: "structure lineation, intersection_lineation, fold_axis or slickenline, plunge rounds to 90",
        structures: &["lineation", "intersection_lineation", "fold_axis", "slickenline"],
        evidence: Evidence::Measured,
        doubt: "stands for every kind of lineation whose own number is not confirmed",
        drawing: &[
            line(&[(-2.25, 0.0), (2.25, 0.0)]),
            line(&[(0.0, -2.25), (0.0, 2.25)]),
            Shape::Filled(&[(0.0, -0.75), (0.75, 0.0), (0.0, 0.75), (-0.75, 0.0)]),
        ],
        ..STEEP_LINE
    },
    Symbol {
        code: "09.017",
        marks: "slickenline, inclined",
        chosen_when: "structure slickenline, plunge between horizontal and vertical",
        structures: &["slickenline"],
        drawing: &[line(&[(0.0, 0.0), (0.0, 4.2)]), Shape::Filled(&[(0.0, 4.2), (0.6, 5.1), (0.0, 6.0), (-0.6, 5.1)])],
        ..LINE
    },
    Symbol {
        code: "09.019",
        marks: "slickenline, horizontal",
        chosen_when: "structure slickenline, plunge rounds to 0",
        structures: &["slickenline"],
        evidence: Evidence::Measured,
        drawing: &[
            line(&[(0.0, -1.2), (0.0, 1.2)]),
            Shape::Filled(&[(0.0, 1.2), (0.6, 2.1), (0.0, 3.0), (-0.6, 2.1)]),
            Shape::Filled(&[(0.0, -1.2), (0.6, -2.1), (0.0, -3.0), (-0.6, -2.1)]),
        ],
        ..FLAT_LINE
    },
    Symbol {
        code: "09.097",
        marks: "axis of a small fold, inclined",
        chosen_when: "structure fold_axis, plunge between horizontal and vertical",
        structures: &["fold_axis"],
        doubt: "where on the shaft the dot belongs is not confirmed",
        drawing: &[SHAFT, HEAD, Shape::Ball { centre: (0.0, 2.25), diameter: 0.6 }],
        ..LINE
    },
    Symbol {
        code: "planar",
        marks: "plane of another kind, inclined",
        chosen_when: "a planar structure without a confirmed number (vein, dike, contact, axial_plane, the user's own), dip between horizontal and vertical",
        evidence: Evidence::Own,
        drawing: fallback::PLANAR,
        ..PLANE
    },
    Symbol {
        code: "planar_horizontal",
        marks: "plane of another kind, horizontal",
        chosen_when: "a planar structure without a number above, dip rounds to 0",
        evidence: Evidence::Own,
        drawing: fallback::PLANAR_HORIZONTAL,
        ..FLAT
    },
    Symbol {
        code: "planar_vertical",
        marks: "plane of another kind, vertical",
        chosen_when: "a planar structure without a number above, dip rounds to 90",
        evidence: Evidence::Own,
        drawing: fallback::PLANAR_VERTICAL,
        ..STEEP
    },
    Symbol {
        code: "linear",
        marks: "line of another kind, inclined",
        chosen_when: "a linear structure without a number above, plunge between horizontal and vertical",
        evidence: Evidence::Own,
        drawing: fallback::LINEAR,
        ..LINE
    },
    Symbol {
        code: "linear_horizontal",
        marks: "line of another kind, horizontal",
        chosen_when: "a linear structure without a number above, plunge rounds to 0",
        evidence: Evidence::Own,
        drawing: fallback::LINEAR_HORIZONTAL,
        ..FLAT_LINE
    },
    Symbol {
        code: "linear_vertical",
        marks: "line of another kind, vertical",
        chosen_when: "a linear structure without a number above, plunge rounds to 90",
        evidence: Evidence::Own,
        drawing: fallback::LINEAR_VERTICAL,
        ..STEEP_LINE
    },
];
