//! The symbol catalogue: what each code marks, how it is drawn, and which one a reading gets.
//!
//! Codes that are numbers are those of FGDC-STD-013-2006, zero-padded so that they sort ("06.02"); codes that are
//! words are this project's own neutral symbols for structures without a confirmed number in the standard.
//!
//! Every symbol is drawn north-up with the station at the centre of its canvas. Planar symbols have their
//! right-hand strike pointing up, so the dip mark stands to the right; lines point up along their trend.
//! A renderer turns them clockwise by the grid azimuth of the strike or trend, except where
//! [`Symbol::turns`] is false.

mod catalogue;
mod choice;
mod drawing;
mod fallback;

pub use catalogue::{ALL, Anchor, Evidence, Symbol};
pub use choice::{Posture, by_code, choose, label};
pub use drawing::{CANVAS_MM, Point, Shape, UNITS_PER_MM, svg, svg_in};
