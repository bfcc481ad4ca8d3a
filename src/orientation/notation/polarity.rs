//! Which way up: the words people use for it.

use super::NotationError;
use crate::orientation::Polarity;

const UPRIGHT: [&str; 13] = [
    "upright",
    "normal",
    "right way up",
    "rightwayup",
    "rwu",
    "rightside up",
    "right side up",
    "way up",
    "not overturned",
    "up",
    "tops up",
    "facing up",
    "younging up",
];
const OVERTURNED: [&str; 16] = [
    "overturned",
    "over turned",
    "overturn",
    "inverted",
    "inverse",
    "reversed",
    "upside down",
    "way down",
    "ot",
    "ovt",
    "o/t",
    "inv",
    "down",
    "tops down",
    "facing down",
    "younging down",
];
const UNKNOWN: [&str; 10] =
    ["", "unknown", "unk", "not known", "?", "na", "n/a", "none", "not determined", "undetermined"];

/// The polarity a cell says. Blank and "unknown" are [`Polarity::Unknown`]; single letters and 0 or 1 mean different
/// things in different files and are refused (U is "upright" here and "unknown" there).
pub fn polarity(text: &str) -> Result<Polarity, NotationError> {
    // Compared without building a lower-case copy: this runs once per row.
    let same = |word: &&'static str| {
        let mut theirs =
            text.trim().bytes().map(|b| if matches!(b, b'-' | b'_') { b' ' } else { b.to_ascii_lowercase() });
        word.bytes().all(|b| theirs.next() == Some(b)) && theirs.next().is_none()
    };
    if UPRIGHT.iter().any(same) {
        Ok(Polarity::Upright)
    } else if OVERTURNED.iter().any(same) {
        Ok(Polarity::Overturned)
    } else if UNKNOWN.iter().any(same) {
        Ok(Polarity::Unknown)
    } else {
        Err(NotationError::Polarity(text.to_owned()))
    }
}

/// True where a description says overturned in passing: "strike and dip of inverted strata".
pub fn overturned_in(description: &str) -> bool {
    let lower = description.to_lowercase();
    let mut before = "";
    lower.split(|c: char| !c.is_alphabetic()).filter(|w| !w.is_empty()).any(|word| {
        let yes = matches!(word, "overturned" | "inverted") && !matches!(before, "not" | "non");
        before = word;
        yes
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    // Common practice, no source.
    #[test]
    fn words_for_way_up() {
        for (text, want) in [
            ("upright", Some(Polarity::Upright)),
            ("Right-Way-Up", Some(Polarity::Upright)),
            (" RWU ", Some(Polarity::Upright)),
            ("OT", Some(Polarity::Overturned)),
            ("Overturned", Some(Polarity::Overturned)),
            ("inverted", Some(Polarity::Overturned)),
            ("", Some(Polarity::Unknown)),
            ("unknown", Some(Polarity::Unknown)),
            ("U", None),
            ("1", None),
            ("overturnedd", None),
        ] {
            assert_eq!(polarity(text).ok(), want, "{text}");
        }
        assert!(overturned_in("Strike and dip of inverted strata") && !overturned_in("strata, not overturned"));
    }
}
