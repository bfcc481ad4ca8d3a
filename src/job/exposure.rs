//! Exposure weights (Terzaghi 1965): what the area file says of the ground the planes were met on.

use super::area_file::FabricSection;
use crate::fabric::terzaghi::Exposure;
use crate::orientation::{Axis, Dip, Plane, TrueAzimuth};
use crate::table::{Cell, Table};

/// What the planes of the job were met on.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum ExposurePlan {
    /// No weights.
    None,
    /// One exposure for all.
    One(Exposure),
    /// A column per source, which says it for each record.
    Column(Vec<Option<String>>),
}

/// Names of an exposure column, where `stations.columns.exposure` names none.
const COLUMNS: [&str; 2] = ["exposure", "scanline"];

impl ExposurePlan {
    /// From `[fabric]`; `columns` are the sources' exposure columns. Errors say which key and why.
    pub fn new(section: &FabricSection, columns: Vec<Option<String>>) -> Result<Self, (&'static str, String, String)> {
        let needed = |key: &'static str, value: &Option<String>, form: &str| {
            let text = value.clone().unwrap_or_default();
            pair(&text).ok_or_else(|| (key, format!("\"{text}\""), format!("must be {form}")))
        };
        Ok(match section.terzaghi.as_str() {
            "map" => Self::One(Exposure::Map),
            "scanline" => {
                let (trend, plunge) =
                    needed("fabric.scanline", &section.scanline, "trend/plunge of the line, as \"110/00\"")?;
                Self::One(Exposure::Line(Axis::from_trend_plunge(trend, plunge)))
            }
            "plane" => {
                let (direction, dip) =
                    needed("fabric.plane", &section.plane, "dip direction/dip of the face, as \"200/60\"")?;
                Self::One(Exposure::Face(face(direction, dip)))
            }
            "column" => Self::Column(columns),
            _ => Self::None,
        })
    }

    /// The exposure of one record of `source`; `None` where it does not say, or not in a form that can be read.
    pub fn of(&self, source: usize, table: &Table, row: usize) -> Option<Exposure> {
        match self {
            Self::None => None,
            Self::One(exposure) => Some(*exposure),
            Self::Column(names) => {
                let named = names.get(source).and_then(Option::as_deref);
                let column = match named {
                    Some(name) => table.column(name)?,
                    None => COLUMNS.iter().find_map(|name| table.column(name))?,
                };
                match column.cell(row) {
                    Cell::Text(text) => exposure(text),
                    _ => None,
                }
            }
        }
    }
}

/// `map`, `line 110/00` (trend/plunge) or `face 200/60` (dip direction/dip).
fn exposure(text: &str) -> Option<Exposure> {
    let text = text.trim().to_lowercase();
    if text == "map" {
        return Some(Exposure::Map);
    }
    let (word, numbers) = text.split_once(char::is_whitespace)?;
    let (azimuth, inclination) = pair(numbers)?;
    match word {
        "line" | "scanline" | "borehole" => Some(Exposure::Line(Axis::from_trend_plunge(azimuth, inclination))),
        "face" | "plane" => Some(Exposure::Face(face(azimuth, inclination))),
        _ => None,
    }
}

fn face(dip_direction: f64, dip: f64) -> Axis {
    let strike = TrueAzimuth::new(dip_direction - 90.0).ok();
    Plane { strike, dip: Dip::new(dip).expect("checked by `pair`") }.pole()
}

/// "110/00": an azimuth in [0, 360] and an inclination in [0, 90].
fn pair(text: &str) -> Option<(f64, f64)> {
    let (azimuth, inclination) = text.split_once('/')?;
    let azimuth: f64 = azimuth.trim().parse().ok()?;
    let inclination: f64 = inclination.trim().parse().ok()?;
    ((0.0..=360.0).contains(&azimuth) && (0.0..=90.0).contains(&inclination)).then_some((azimuth, inclination))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn exposures_are_read_and_nonsense_is_not() {
        assert_eq!(exposure(" MAP "), Some(Exposure::Map));
        assert_eq!(exposure("line 110/00"), Some(Exposure::Line(Axis::from_trend_plunge(110.0, 0.0))));
        // A face dipping 60 towards 200 has its pole at 020/30.
        let Some(Exposure::Face(pole)) = exposure("face 200/60") else { panic!() };
        assert!(pole.angle_to(Axis::from_trend_plunge(20.0, 30.0)) < 1e-12);
        for bad in ["", "line", "line 110", "line 400/0", "line 10/95", "110/00", "face x/y", "line NaN/0"] {
            assert_eq!(exposure(bad), None, "{bad}");
        }
    }
}
