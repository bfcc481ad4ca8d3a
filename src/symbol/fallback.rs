//! Shapes of this project's own neutral symbols: a small open circle marks them, which no planar or linear symbol
//! taken from the standard here has, so none of them can be mistaken for one.

use super::Shape;
use super::drawing::STROKE;

/// Strike line, tick that ends in an open circle.
pub(super) const PLANAR: &[Shape] = &[
    Shape::Line { points: &[(0.0, -2.5), (0.0, 2.5)], width: STROKE },
    Shape::Line { points: &[(0.0, 0.0), (0.6, 0.0)], width: STROKE },
    Shape::Ring { centre: (1.0, 0.0), diameter: 0.8 },
];
/// Two circles, one in the other.
pub(super) const PLANAR_HORIZONTAL: &[Shape] =
    &[Shape::Ring { centre: (0.0, 0.0), diameter: 2.5 }, Shape::Ring { centre: (0.0, 0.0), diameter: 0.8 }];
/// Strike line through an open circle on either side.
pub(super) const PLANAR_VERTICAL: &[Shape] = &[
    Shape::Line { points: &[(0.0, -2.5), (0.0, 2.5)], width: STROKE },
    Shape::Line { points: &[(-0.6, 0.0), (0.6, 0.0)], width: STROKE },
    Shape::Ring { centre: (1.0, 0.0), diameter: 0.8 },
    Shape::Ring { centre: (-1.0, 0.0), diameter: 0.8 },
];
/// Open circle on the station, shaft, barbs.
pub(super) const LINEAR: &[Shape] = &[
    Shape::Ring { centre: (0.0, 0.0), diameter: 0.8 },
    Shape::Line { points: &[(0.0, 0.4), (0.0, 6.0)], width: STROKE },
    Shape::Line { points: &[(-0.67, 4.8), (0.0, 6.0), (0.67, 4.8)], width: STROKE },
];
/// Open circle on the station, shaft and barbs both ways.
pub(super) const LINEAR_HORIZONTAL: &[Shape] = &[
    Shape::Ring { centre: (0.0, 0.0), diameter: 0.8 },
    Shape::Line { points: &[(0.0, 0.4), (0.0, 3.0)], width: STROKE },
    Shape::Line { points: &[(0.0, -0.4), (0.0, -3.0)], width: STROKE },
    Shape::Line { points: &[(-0.67, 1.8), (0.0, 3.0), (0.67, 1.8)], width: STROKE },
    Shape::Line { points: &[(-0.67, -1.8), (0.0, -3.0), (0.67, -1.8)], width: STROKE },
];
/// Open circle with four arms.
pub(super) const LINEAR_VERTICAL: &[Shape] = &[
    Shape::Ring { centre: (0.0, 0.0), diameter: 0.8 },
    Shape::Line { points: &[(0.4, 0.0), (2.25, 0.0)], width: STROKE },
    Shape::Line { points: &[(-0.4, 0.0), (-2.25, 0.0)], width: STROKE },
    Shape::Line { points: &[(0.0, 0.4), (0.0, 2.25)], width: STROKE },
    Shape::Line { points: &[(0.0, -0.4), (0.0, -2.25)], width: STROKE },
];
