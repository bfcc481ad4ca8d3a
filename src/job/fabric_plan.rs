//! `[fabric]` as checked: how fabrics are to be described.

use super::area_error::AreaFileError;
use super::area_file::{AreaFile, NumberOrText};
use super::exposure::ExposurePlan;
use crate::fabric::sets::{LARGEST_COUNT, SetCount};

/// How confidence cones are found.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Uncertainty {
    /// The ellipse with its small-sample factor.
    Ellipse,
    /// The pivotal bootstrap.
    Pivotal,
    /// The percentile bootstrap.
    Percentile,
}

impl Uncertainty {
    const ALL: [Self; 3] = [Self::Ellipse, Self::Pivotal, Self::Percentile];

    /// The word of the area file.
    pub fn word(self) -> &'static str {
        match self {
            Self::Ellipse => "ellipse",
            Self::Pivotal => "pivotal",
            Self::Percentile => "percentile",
        }
    }
}

/// How fabrics are to be described.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct FabricPlan {
    pub confidence: f64,
    pub uncertainty: Uncertainty,
    pub resamples: usize,
    pub sets: SetCount,
    /// Structures whose lines or planes carry a sense.
    pub directed: Vec<String>,
    pub exposure: ExposurePlan,
    /// Cap on an exposure weight.
    pub max_weight: f64,
}

impl FabricPlan {
    /// From the options of area file `file`.
    pub fn new(file: &str, options: &AreaFile) -> Result<Self, AreaFileError> {
        let section = &options.fabric;
        let words = Uncertainty::ALL.map(Uncertainty::word);
        let uncertainty = Uncertainty::ALL.into_iter().find(|u| u.word() == section.uncertainty).ok_or_else(|| {
            let message = format!("must be one of {}", words.join(", "));
            AreaFileError::value(file, "fabric.uncertainty", format!("\"{}\"", section.uncertainty), message)
        })?;
        if uncertainty != Uncertainty::Ellipse && !(100..=1_000_000).contains(&section.resamples) {
            let message = "a bootstrap needs 100 to 1000000 resamples";
            return Err(AreaFileError::value(file, "fabric.resamples", section.resamples, message));
        }
        let sets = match &section.sets {
            NumberOrText::Text(word) if word == "auto" => SetCount::Auto,
            NumberOrText::Number(n) if n.fract() == 0.0 && (0.0..=LARGEST_COUNT as f64).contains(n) => {
                SetCount::Given(*n as usize)
            }
            other => {
                let value = match other {
                    NumberOrText::Number(n) => n.to_string(),
                    NumberOrText::Text(t) => format!("\"{t}\""),
                };
                let message = format!("must be \"auto\", or a whole number from 0 (none) to {LARGEST_COUNT}");
                return Err(AreaFileError::value(file, "fabric.sets", value, message));
            }
        };
        let columns = options.stations.iter().map(|s| s.columns.exposure.clone()).collect();
        let exposure = ExposurePlan::new(section, columns)
            .map_err(|(key, value, message)| AreaFileError::value(file, key, value, message))?;
        Ok(Self {
            confidence: section.confidence,
            uncertainty,
            resamples: section.resamples as usize,
            sets,
            directed: section.directed.clone(),
            exposure,
            max_weight: section.max_weight,
        })
    }
}
