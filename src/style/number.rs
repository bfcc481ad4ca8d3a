//! Where the dip or plunge is printed: upright, just beyond the dip mark or the arrow's tip.

use crate::station::Kind;

/// Half the diagonal of two digits at [`POINTS`], plus a little air; millimetres.
const CLEARANCE: f64 = 2.0;
/// Size of the number in points.
pub(super) const POINTS: f64 = 6.5;

/// From the station to the middle of the number, for a symbol at its own size; millimetres.
pub(super) fn distance(kind: Kind) -> f64 {
    let tip = match kind {
        Kind::Planar => 1.0,
        Kind::Linear => 6.0,
    };
    tip + CLEARANCE
}
