//! Every statistic of one sample, and a plain word for each that is missing.

use super::axis_cone::{self, Cone, NoCone};
use super::bingham::{self, Bingham};
use super::sample::{self, Kind, Sample};
use super::sets::Sets;
use super::shape::{self, Shape};
use super::{fisher, ratios, uniformity, watson};
use crate::orientation::{Axis, Eigen};

/// Fewest readings for a shape and a mean, and fewest to trust them. Judgement, after the coverage of the
/// cone of the mean in own simulations.
pub const LEAST: usize = 5;
/// Below this many readings every statement is called weak.
pub const TRUSTED: f64 = 10.0;

/// How samples are summarised.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FabricOptions {
    /// Confidence of cones, in (0, 1).
    pub confidence: f64,
    /// Whether two maxima of poles on one great circle may be the limbs of a fold (bedding, foliation) rather
    /// than two sets (joints, veins).
    pub folded: bool,
}

impl Default for FabricOptions {
    fn default() -> Self {
        Self { confidence: 0.95, folded: true }
    }
}

/// The statistics of one sample. Angles in degrees; `None` is explained in `note`.
#[derive(Debug, Clone, PartialEq)]
pub struct Fabric {
    /// Poles or lines.
    pub kind: Kind,
    /// How many readings.
    pub n: usize,
    /// How many stations they come from.
    pub n_stations: usize,
    /// Sum of weights.
    pub weight_sum: f64,
    /// (sum w)^2 / sum w^2 over readings: how many equally weighted readings say as much.
    pub n_effective: f64,
    /// The same over stations: how many independent witnesses tests and cones count.
    pub units: f64,
    /// Eigenvalues S1 >= S2 >= S3 and their axes.
    pub eigen: Option<Eigen>,
    /// The mean axis e1, where the shape has one.
    pub mean: Option<Axis>,
    /// Confidence cone of e1.
    pub mean_cone: Option<Cone>,
    /// Confidence cone of e3, the fold axis of poles.
    pub third_cone: Option<Cone>,
    /// Woodcock's form K.
    pub woodcock_k: Option<f64>,
    /// Woodcock's strength C.
    pub woodcock_c: Option<f64>,
    /// Vollmer's P, G, R.
    pub vollmer: Option<[f64; 3]>,
    /// Length of the sum of the axes turned to e1's side, in units of equally weighted readings (0 to n).
    pub resultant: Option<f64>,
    /// Fisher's kappa of these, (n-1)/(n-R).
    pub fisher_kappa: Option<f64>,
    /// Fisher's cone of the mean of the stations' directions, at 0.95 whatever the confidence asked for.
    pub fisher_alpha95: Option<f64>,
    /// Watson's kappa, the likelier of bipolar (positive, about e1) and girdle (negative, away from e3).
    pub watson_kappa: Option<f64>,
    /// Bingham's k2 and k3 where k1 = 0 belongs to e1.
    pub bingham: Option<Bingham>,
    /// Bingham's test of uniformity, corrected for small samples, stations as units.
    pub uniformity_p: Option<f64>,
    /// Form of the fabric.
    pub shape: Shape,
    /// Why a value is missing or weak: sentences joined by "; ".
    pub note: String,
}

/// Every statistic of `sample`. Any sample gets an answer; what cannot be said is `None`, with a note.
pub fn summarise(sample: &Sample, options: &FabricOptions) -> Fabric {
    let tensor = sample.tensor();
    let stations = sample.stations();
    let by_station = sample::units(sample, &stations);
    let mut notes: Vec<String> = Vec::new();
    let mut fabric = Fabric {
        kind: sample.kind(),
        n: sample.len(),
        n_stations: stations.len(),
        weight_sum: tensor.weight(),
        n_effective: tensor.effective_count(),
        units: axis_cone::effective_units(&by_station),
        eigen: tensor.eigen(),
        mean: None,
        mean_cone: None,
        third_cone: None,
        woodcock_k: None,
        woodcock_c: None,
        vollmer: None,
        resultant: None,
        fisher_kappa: None,
        fisher_alpha95: None,
        watson_kappa: None,
        bingham: None,
        uniformity_p: None,
        shape: Shape::TooFew,
        note: String::new(),
    };
    let Some(eigen) = fabric.eigen else {
        fabric.note = "no readings".into();
        return fabric;
    };
    (fabric.woodcock_k, fabric.woodcock_c) = ratios::woodcock(eigen.values);
    fabric.vollmer = Some(ratios::vollmer(eigen.values));
    notes.extend(ratios::woodcock_gap(eigen.values).map(String::from));

    if sample.len() < LEAST {
        notes.insert(0, format!("a shape and a mean need {LEAST} readings, there are {}", sample.len()));
        fabric.note = notes.join("; ");
        return fabric;
    }
    // Where stations are too few to speak for a domain, the readings at least describe themselves.
    let apart = Sample::clone(sample).apart();
    let few_stations = fabric.units < axis_cone::LEAST - 1e-9;
    let (witnesses, grouping, units) = if few_stations {
        let grouping = apart.stations();
        let units = sample::units(&apart, &grouping);
        (&apart, grouping, units)
    } else {
        (sample, stations, by_station)
    };
    let count = axis_cone::effective_units(&units);
    if count < axis_cone::LEAST - 1e-9 {
        notes
            .insert(0, format!("a shape and a mean need {LEAST} readings of equal weight, these are worth {count:.1}"));
        fabric.note = notes.join("; ");
        return fabric;
    }
    fabric.watson_kappa = watson::best(eigen.values).map(|w| w.kappa);
    fabric.bingham = bingham::fit(eigen.values);
    if fabric.bingham.is_none() {
        notes.push("the axes lie in one plane, so Bingham's k3 is infinite".into());
    }
    let independent = uniformity::independent_axes(&units);
    let p = uniformity::bingham_p(independent, uniformity::bingham_statistic(independent, eigen.values));
    let cones = [0, 2].map(|i| axis_cone::cone(&units, &eigen, i, options.confidence));
    let (shape, remarks) = shape::classify(&shape::Evidence {
        sample: witnesses,
        stations: &grouping,
        units: &units,
        eigen: &eigen,
        uniformity_p: p,
        independent,
        first: &cones[0],
        third: &cones[1],
        folded: options.folded,
    });
    fabric.shape = shape;
    notes.extend(remarks);
    if few_stations {
        notes.push(format!(
            "tests and cones need {LEAST} stations, these {} count as {:.1}: the shape describes the readings only",
            fabric.n_stations, fabric.units
        ));
    } else {
        fabric.uniformity_p = Some(p);
        // Axes of what may be noise have no direction to be sure of.
        if shape != Shape::Random {
            fabric.mean_cone = cones[0].ok();
            fabric.third_cone = cones[1].ok();
        }
    }
    match (shape.has_mean(), &cones[0]) {
        (true, Err(NoCone::Undetermined)) => {
            notes.push("the mean axis is undetermined, within 45 degrees or more".into())
        }
        (true, _) => fabric.mean = Some(eigen.axes[0]),
        (false, _) => notes.push(no_mean(shape).into()),
    }
    if shape == Shape::Cluster {
        fisher_fields(&mut fabric, sample, eigen.axes[0], few_stations, &mut notes);
    }
    if shape == Shape::Transitional {
        notes.push("no Fisher statistics: the scatter is elongate, not round about its mean".into());
    }
    if count < TRUSTED {
        notes.push(format!("weak: fewer than {TRUSTED} independent readings"));
    }
    fabric.note = notes.join("; ");
    fabric
}

/// Sets see more than the shape's own look for maxima: where two or more were found that are no limbs of a fold,
/// the fabric is multimodal and has no mean.
pub fn with_sets(mut fabric: Fabric, sets: &Sets, options: &FabricOptions) -> Fabric {
    /// A lesser second set leaves the first one its mean.
    const LEAST_SHARE: f64 = 0.2;
    let several = sets.sets.get(1).is_some_and(|second| second.share >= LEAST_SHARE);
    let limbs = options.folded && fabric.kind == Kind::Planar;
    let changes = match fabric.shape {
        Shape::Cluster | Shape::Random => several,
        Shape::Transitional | Shape::Girdle => several && !limbs,
        Shape::TooFew | Shape::Multimodal => false,
    };
    if changes {
        let note = format!("{} sets: {}", sets.sets.len(), no_mean(Shape::Multimodal));
        fabric.note = if fabric.note.is_empty() { note } else { format!("{note}; {}", fabric.note) };
        fabric.shape = Shape::Multimodal;
        fabric.mean = None;
        (fabric.resultant, fabric.fisher_kappa, fabric.fisher_alpha95) = (None, None, None);
    }
    fabric
}

fn fisher_fields(f: &mut Fabric, sample: &Sample, e1: Axis, few: bool, notes: &mut Vec<String>) {
    let all = fisher::axial_resultant(sample, e1);
    f.resultant = Some(all.length);
    f.fisher_kappa = all.kappa();
    if f.fisher_kappa.is_none() {
        notes.push("all axes are parallel, so Fisher kappa is infinite".into());
    }
    if !few {
        f.fisher_alpha95 = fisher::station_resultant(sample, &sample.stations(), e1).alpha(0.95);
    }
}

fn no_mean(shape: Shape) -> &'static str {
    match shape {
        Shape::Girdle => "a girdle has a fold axis but no mean attitude",
        Shape::Multimodal => "several maxima have no common mean: see the sets",
        Shape::Random => "no preferred orientation, so no mean",
        Shape::TooFew | Shape::Cluster | Shape::Transitional => "no mean",
    }
}
