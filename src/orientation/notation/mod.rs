//! Attitudes as people write them, read into one typed form, and printed again.
//!
//! Every way of writing ends in a [`Measured`]: right-hand strike and dip for a plane, trend and plunge for a line.
//! What says of itself how it is meant (compass letters, an arrow) keeps that meaning; for plain numbers the
//! [`Notation`] decides. Contradictions, codes for missing values and numbers out of range are refused, never mended.
//!
//! Sources: the notations are common practice of the trade, no single source.

mod check;
mod column;
mod compass;
mod error;
mod plane;
mod polarity;
mod print;
mod scan;
mod text;

pub use check::{azimuth, inclination, is_missing_code, line, plunge_with_sense};
pub use column::{AzimuthCell, DipCell, azimuth_cell, degrees_cell, dip_cell, point_cell, rake_cell};
pub use compass::{CompassPoint, compass_point};
pub use error::{NotationError, Quantity};
pub use plane::{STRIKE_TOLERANCE, agree, line_from_rake, plane};
pub use polarity::{overturned_in, polarity};
pub use print::{Printed, shown};
pub use text::{Order, Wanted, Written, attitude, written_as};

use super::{Measured, Polarity};

/// How plain azimuth and dip numbers are to be read.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub enum Notation {
    /// From the evidence: compass letters, an arrow, the names of the columns; else right-hand.
    #[default]
    Auto,
    /// Strike with the dip to its right: dip direction = strike + 90.
    RightHand,
    /// Strike with the dip to its left: dip direction = strike - 90.
    LeftHand,
    /// Azimuth of steepest descent, and dip.
    DipDirection,
    /// Either end of the strike line; compass letters beside the dip say the side.
    Quadrant,
    /// Trend and plunge of a line.
    TrendPlunge,
}

impl Notation {
    /// All of them, in the order area files list them.
    pub const ALL: [Self; 6] =
        [Self::RightHand, Self::LeftHand, Self::DipDirection, Self::Quadrant, Self::TrendPlunge, Self::Auto];

    /// The word used in area files.
    pub fn word(self) -> &'static str {
        match self {
            Self::Auto => "auto",
            Self::RightHand => "right-hand",
            Self::LeftHand => "left-hand",
            Self::DipDirection => "dip-direction",
            Self::Quadrant => "quadrant",
            Self::TrendPlunge => "trend-plunge",
        }
    }
    /// The notation a word of the area file names.
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|n| n.word() == word)
    }
}

/// One attitude as read.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reading {
    /// The attitude.
    pub measured: Measured,
    /// True where an azimuth in [360, 720) was brought into [0, 360).
    pub wrapped: bool,
    /// Polarity, where the same text told it.
    pub polarity: Option<Polarity>,
}
