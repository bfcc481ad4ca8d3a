//! What kind of fabric it is: the word a geologist would use, and when to refuse one.

use super::axis_cone::{Cone, NoCone};
use super::sample::{Kind, Sample, Stations, Unit};
use super::{girdle_arc, harmonics, modes, uniformity};
use crate::orientation::{Axis, Eigen, ExactSum};
use statrs::distribution::{ContinuousCDF, StudentsT};
use std::cmp::Ordering;

/// Form of a fabric.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Shape {
    /// One preferred direction; the mean axis means something.
    Cluster,
    /// Axes spread along a great circle; the normal of the circle (fold axis) means something, the mean does not.
    Girdle,
    /// Between the two: elongate, with a known mean axis and often a known fold axis.
    Transitional,
    /// Several maxima.
    Multimodal,
    /// No preferred orientation shown.
    Random,
    /// Too few readings to say.
    TooFew,
}

impl Shape {
    /// The word written into layers.
    pub fn word(self) -> &'static str {
        match self {
            Self::Cluster => "cluster",
            Self::Girdle => "girdle",
            Self::Transitional => "transitional",
            Self::Multimodal => "multimodal",
            Self::Random => "random",
            Self::TooFew => "too_few",
        }
    }
    /// True where e1 is a mean attitude.
    pub fn has_mean(self) -> bool {
        matches!(self, Self::Cluster | Self::Transitional)
    }
}

/// A girdle's axes must spread over at least this many degrees of their great circle (the shortest arc that
/// holds 90 % of them); a shorter band still has a mean. Judgement: the least arc from which a fold axis is
/// commonly taken.
pub const LEAST_ARC: f64 = 60.0;

/// Below this many readings a fabric with a known mean axis is not called a girdle: of five readings of a round
/// cluster one sample in ten looks like one (own simulation).
pub const LEAST_IN_GIRDLE: f64 = 8.0;

/// The form (which side of K = 1) is told at this confidence. A label, not a test: at 0.95 a cluster of 50 with
/// K = 2 would go unnamed.
const FORM_CONFIDENCE: f64 = 0.68;

/// Harmonic test level: it is tried only on what the tensor calls random, so it may not add many false alarms.
const HIDDEN_LEVEL: f64 = 0.01;

/// What the decision rests on.
pub(super) struct Evidence<'a> {
    pub sample: &'a Sample<'a>,
    /// Grouping whose members count as one witness.
    pub stations: &'a Stations,
    pub units: &'a [Unit],
    pub eigen: &'a Eigen,
    /// Bingham's corrected test.
    pub uniformity_p: f64,
    /// Independent axes the units are worth under uniformity.
    pub independent: f64,
    pub first: &'a Result<Cone, NoCone>,
    pub third: &'a Result<Cone, NoCone>,
    pub folded: bool,
}

/// The shape, and remarks on it.
///
/// 1. *random* unless Bingham's corrected test is below 0.05 or S1/S3 passes its 99 % limit; before the word
///    is used, the degree 4 test and the fullest cap must be unremarkable too, else *multimodal*.
/// 2. Two or more maxima with a real gap between them: *multimodal*; but where they lie on one great circle
///    and are poles of folded surfaces, they are limbs: *girdle*.
/// 3. Otherwise ln S1 + ln S3 - 2 ln S2, which is positive exactly where Woodcock's K > 1, with its
///    confidence interval from the stations: above zero, or e3 undetermined: *cluster*; below zero, or e1
///    undetermined, on an arc of 60 degrees or more and with 8 readings: *girdle*; neither: *transitional* (on a short arc and
///    below ten readings: *cluster*).
pub(super) fn classify(e: &Evidence) -> (Shape, Vec<String>) {
    let mut notes = Vec::new();
    let [s1, s2, s3] = e.eigen.values;
    let beyond_limit = uniformity::ratio_limit(e.independent, true).is_some_and(|limit| s1 > limit * s3);
    let searchable = e.independent >= modes::LEAST;
    if e.uniformity_p >= 0.05 && !beyond_limit {
        if searchable
            && (harmonics::degree_four_p(e.sample, e.stations) < HIDDEN_LEVEL
                || modes::peak_p(e.sample, e.independent) < HIDDEN_LEVEL)
        {
            notes.push("the tensor alone looks random, but the axes are concentrated in several directions".into());
            return (Shape::Multimodal, notes);
        }
        if !searchable {
            notes.push(format!(
                "no preferred orientation shown; with fewer than {} independent readings several sets would go unseen",
                modes::LEAST
            ));
        }
        return (Shape::Random, notes);
    }
    if searchable {
        let found = modes::modes(e.sample, e.independent);
        if found.len() > 1 {
            let pole = e.eigen.axes[2];
            let in_plane = s2 > s3 && found.iter().all(|m| 90.0 - m.axis.angle_to(pole) <= ON_CIRCLE);
            if in_plane && e.folded && e.sample.kind() == Kind::Planar && e.third.is_ok() {
                notes.push(format!("{} maxima on one great circle, read as limbs of a fold", found.len()));
                return (Shape::Girdle, notes);
            }
            notes.push(format!("{} separate maxima at {}", found.len(), listed(&found)));
            return (Shape::Multimodal, notes);
        }
    }
    if s2 <= Eigen::EQUAL {
        return (Shape::Cluster, notes);
    }
    let (first_known, third_known) = (e.first.is_ok(), e.third.is_ok());
    let shape = match form_side(e) {
        Ordering::Greater if first_known => Shape::Cluster,
        Ordering::Less if third_known => girdle_or_band(e, &mut notes),
        Ordering::Equal if first_known && !third_known => Shape::Cluster,
        Ordering::Equal if third_known && !first_known => girdle_or_band(e, &mut notes),
        _ if first_known => band(e, &mut notes),
        _ => Shape::Transitional,
    };
    (shape, notes)
}

/// Scatter along an arc shorter than this (degrees, holding 90 % of the axes) is a cluster whatever its form: it is
/// hardly more than what a compass and an undulating surface give (judgement).
const TIGHT: f64 = 20.0;
/// Maxima within this many degrees of a great circle lie on it.
const ON_CIRCLE: f64 = 20.0;

fn girdle_or_band(e: &Evidence, notes: &mut Vec<String>) -> Shape {
    let enough = super::axis_cone::effective_units(e.units) >= LEAST_IN_GIRDLE - 1e-9;
    if e.first.is_err() || (enough && girdle_arc::arc(e.sample, e.eigen, 0.9) >= LEAST_ARC) {
        Shape::Girdle
    } else {
        band(e, notes)
    }
}

/// A mean axis is known, but the scatter about it is not shown to be round. Below ten readings round clusters
/// look elongate by chance as often as not, so a narrow one keeps its name.
fn band(e: &Evidence, notes: &mut Vec<String>) -> Shape {
    let arc = girdle_arc::arc(e.sample, e.eigen, 0.9);
    if arc >= LEAST_ARC {
        return Shape::Transitional;
    }
    if super::axis_cone::effective_units(e.units) < super::TRUSTED {
        return Shape::Cluster;
    }
    if arc < TIGHT {
        notes.push(format!(
            "elongate, but within {arc:.0} degrees: Fisher's statistics take the scatter as round, the cone of the mean does not"
        ));
        return Shape::Cluster;
    }
    notes.push(format!("elongate over {arc:.0} degrees of a great circle, narrow enough for a mean"));
    Shape::Transitional
}

/// Which side of K = 1 the fabric is on: `Equal` where the interval of ln S1 + ln S3 - 2 ln S2 holds zero.
fn form_side(e: &Evidence) -> Ordering {
    let [s1, s2, s3] = e.eigen.values;
    if s3 <= Eigen::EQUAL {
        return Ordering::Less;
    }
    let form = s1.ln() + s3.ln() - 2.0 * s2.ln();
    let vectors = e.eigen.axes.map(Axis::vector);
    let (mut squares, mut weight) = (ExactSum::default(), ExactSum::default());
    for unit in e.units {
        let [a, b, c] = vectors.map(|v| unit.form(&v, &v));
        let influence = a / s1 + c / s3 - 2.0 * b / s2;
        // Eigenvalues near zero can give huge influences; beyond this the interval holds zero anyway.
        squares.add_term((influence * influence).min(1e9));
        weight.add_term(unit.weight);
    }
    let n = super::axis_cone::effective_units(e.units);
    let error = (squares.value() * n / (n - 1.0)).sqrt() / weight.value();
    // The constructor fails only for a freedom that is not positive.
    let Ok(t) = StudentsT::new(0.0, 1.0, n - 1.0) else { return Ordering::Equal };
    let reach = t.inverse_cdf(0.5 + FORM_CONFIDENCE / 2.0) * error;
    if form > reach {
        Ordering::Greater
    } else if form < -reach {
        Ordering::Less
    } else {
        Ordering::Equal
    }
}

fn listed(found: &[modes::Mode]) -> String {
    found.iter().map(|m| format!("{:03.0}/{:02.0}", m.axis.trend(), m.axis.plunge())).collect::<Vec<_>>().join(", ")
}
