//! Which symbol a reading gets, and the number beside it.

use super::{ALL, Symbol};
use crate::orientation::Polarity;
use crate::station::Kind;

/// How steep a reading is, as far as symbols care. A dip or plunge counts as what it would be printed as:
/// it is horizontal where it rounds to 0 (below 0.5 degrees) and vertical where it rounds to 90 (from 89.5 degrees).
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Posture {
    /// Rounds to 0 degrees.
    Horizontal,
    /// Everything between.
    Inclined,
    /// Rounds to 90 degrees.
    Vertical,
}

impl Posture {
    /// All three.
    pub const ALL: [Self; 3] = [Self::Horizontal, Self::Inclined, Self::Vertical];

    /// Of a dip or plunge in degrees, [0, 90].
    pub fn of(inclination: f64) -> Self {
        if inclination < 0.5 {
            Self::Horizontal
        } else if inclination >= 89.5 {
            Self::Vertical
        } else {
            Self::Inclined
        }
    }
    /// The word for it.
    pub fn word(self) -> &'static str {
        match self {
            Self::Horizontal => "horizontal",
            Self::Inclined => "inclined",
            Self::Vertical => "vertical",
        }
    }
}

/// The symbol for a reading: by its structure, its posture and, for inclined bedding, its polarity.
///
/// `inclination` is the dip or plunge in degrees, [0, 90]. A structure without an entry of its own in the catalogue
/// (or without one for this posture) gets the neutral symbol of its kind, so every reading is drawn.
/// Polarity says nothing about a vertical bed (neither side is below), nor about any structure but bedding.
pub fn choose(structure: &str, kind: Kind, inclination: f64, polarity: Polarity) -> &'static Symbol {
    let posture = Posture::of(inclination);
    ALL.iter()
        .find(|s| s.suits(structure, kind, posture, polarity))
        .or_else(|| ALL.iter().find(|s| s.is_fallback() && s.kind == kind && s.posture == posture))
        .expect("the catalogue has a neutral symbol for both kinds and all postures, as its test shows")
}

/// The number to print beside the symbol: dip or plunge in whole degrees, halves up; none for horizontal and
/// vertical, where the symbol itself says it. The same for planes and lines.
pub fn label(_kind: Kind, inclination: f64) -> Option<String> {
    (Posture::of(inclination) == Posture::Inclined).then(|| format!("{:.0}", inclination.round()))
}

/// The catalogue's entry of this code.
pub fn by_code(code: &str) -> Option<&'static Symbol> {
    ALL.iter().find(|s| s.code == code)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::station::STRUCTURES;

    const POLARITIES: [Polarity; 3] = [Polarity::Upright, Polarity::Overturned, Polarity::Unknown];

    #[test]
    fn at_most_one_entry_suits_a_reading_and_every_reading_gets_one_of_its_kind_and_posture() {
        let own = [("shear_band", Kind::Planar), ("boudin_neck", Kind::Linear), ("bedding", Kind::Linear)];
        for (structure, kind) in STRUCTURES.into_iter().chain(own) {
            for (posture, inclination) in Posture::ALL.into_iter().zip([0.0, 45.0, 90.0]) {
                for polarity in POLARITIES {
                    let suiting = ALL.iter().filter(|s| s.suits(structure, kind, posture, polarity)).count();
                    assert!(suiting <= 1, "{suiting} symbols for {structure} {posture:?} {polarity:?}");
                    let chosen = choose(structure, kind, inclination, polarity);
                    assert_eq!((chosen.kind, chosen.posture), (kind, posture));
                    assert_eq!(chosen.is_fallback(), suiting == 0);
                }
            }
        }
    }

    #[test]
    fn a_reading_is_drawn_as_its_rounded_dip_is_printed() {
        let code = |dip| choose("bedding", Kind::Planar, dip, Polarity::Unknown).code;
        assert_eq!(
            [0.0, 0.49, 0.5, 45.0, 89.49, 89.5, 90.0].map(code),
            ["06.01", "06.01", "06.02", "06.02", "06.02", "06.03", "06.03"]
        );
        let number = |dip| label(Kind::Planar, dip).unwrap_or_default();
        assert_eq!([0.49, 0.5, 1.4, 44.5, 45.5, 89.49, 89.5].map(number), ["", "1", "1", "45", "46", "89", ""]);
    }
}
