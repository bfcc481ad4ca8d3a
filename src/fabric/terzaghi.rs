//! Weights against the sampling bias of surveys along a line or on a face (Terzaghi 1965).

use crate::orientation::Axis;
use thiserror::Error;

/// Where planes were met.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Exposure {
    /// Level ground, or a map: weight 1/sin(dip).
    Map,
    /// A scanline or borehole along this line: weight 1/|n.s|, the sine of the angle between plane and line.
    Line(Axis),
    /// A face whose pole this is: weight 1/sqrt(1 - (n.m)^2).
    Face(Axis),
}

/// Exposure of a whole sample, or of each record.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Survey<'a> {
    /// One for all.
    One(Exposure),
    /// One per record; `None` where a record does not say.
    Each(&'a [Option<Exposure>]),
}

/// Weights and how many of them were cut off.
#[derive(Debug, Clone, PartialEq)]
pub struct Weights {
    /// One per pole, in [1, cap].
    pub weights: Vec<f64>,
    /// How many would have been heavier than the cap.
    pub clipped: usize,
}

/// Why there are no weights.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum WeightError {
    /// A record without exposure.
    #[error("reading {index} does not say along what it was measured, so its sampling bias is unknown")]
    NoExposure {
        /// Position in the sample.
        index: usize,
    },
    /// Columns of unequal length.
    #[error("{poles} poles but {exposures} exposures")]
    Length {
        /// How many poles.
        poles: usize,
        /// How many exposures.
        exposures: usize,
    },
    /// A cap that is not one.
    #[error("a greatest weight of {0} is not a finite number of 1 or more")]
    Cap(f64),
}

/// The sine of the angle at which an exposure meets a plane: 0 where they are parallel.
fn sine(pole: Axis, exposure: Exposure) -> f64 {
    let n = pole.vector();
    match exposure {
        Exposure::Map => n.x.hypot(n.y),
        Exposure::Line(line) => n.dot(&line.vector()).abs(),
        // The norm of the cross product keeps its digits near 0, where 1 - (n.m)^2 loses them.
        Exposure::Face(face) => n.cross(&face.vector()).norm(),
    }
}

/// Weights 1/sine, at most `cap`, of poles of planes. Lines have no such bias: do not ask. A cap of 10 is
/// commonly used (Priest 1993, from memory); weights up to 2.92 keep within 70 degrees of the line (Goodman 1976,
/// quoted in Brady & Brown). All standard errors of a weighted sample use (sum w)^2 / sum w^2.
pub fn weights(poles: &[Axis], survey: Survey, cap: f64) -> Result<Weights, WeightError> {
    if !(cap >= 1.0 && cap.is_finite()) {
        return Err(WeightError::Cap(cap));
    }
    if let Survey::Each(each) = survey
        && each.len() != poles.len()
    {
        return Err(WeightError::Length { poles: poles.len(), exposures: each.len() });
    }
    let mut result = Weights { weights: Vec::with_capacity(poles.len()), clipped: 0 };
    for (index, &pole) in poles.iter().enumerate() {
        let exposure = match survey {
            Survey::One(e) => e,
            Survey::Each(each) => each[index].ok_or(WeightError::NoExposure { index })?,
        };
        let sine = sine(pole, exposure);
        if sine * cap < 1.0 {
            result.clipped += 1;
            result.weights.push(cap);
        } else {
            result.weights.push((1.0 / sine).max(1.0));
        }
    }
    Ok(result)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn parallel_planes_are_capped_and_counted() {
        let flat = Axis::from_trend_plunge(0.0, 90.0);
        let steep = Axis::from_trend_plunge(90.0, 0.0);
        let north = Axis::from_trend_plunge(0.0, 0.0);
        for (pole, exposure, weight, clipped) in [
            (flat, Exposure::Map, 10.0, 1),
            (steep, Exposure::Map, 1.0, 0),
            (steep, Exposure::Line(north), 10.0, 1),
            (north, Exposure::Line(north), 1.0, 0),
            (north, Exposure::Face(north), 10.0, 1),
            (steep, Exposure::Face(north), 1.0, 0),
        ] {
            let w = weights(&[pole], Survey::One(exposure), 10.0).unwrap();
            assert_eq!((w.weights[0], w.clipped), (weight, clipped), "{exposure:?}");
        }
    }

    #[test]
    fn what_cannot_be_weighted_is_refused() {
        let poles = [Axis::from_trend_plunge(0.0, 30.0); 2];
        let each = [Some(Exposure::Map), None];
        assert_eq!(weights(&poles, Survey::Each(&each), 10.0), Err(WeightError::NoExposure { index: 1 }));
        assert!(weights(&poles, Survey::Each(&each[..1]), 10.0).is_err());
        for cap in [0.5, f64::NAN, f64::INFINITY] {
            assert!(weights(&poles, Survey::One(Exposure::Map), cap).is_err());
        }
    }
}
