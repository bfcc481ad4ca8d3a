//! Fold axes: from the girdle of poles, with its quality, and whether a cone fits the poles better.

use super::axis_cone::{self, Cone, NoCone};
use super::sample::{Sample, heaviest, units};
use super::sets::Sets;
use super::{girdle_arc, ratios, small_circle, small_circle::SmallCircle};
use crate::orientation::{Axis, ExactSum};
use statrs::distribution::{ContinuousCDF, FisherSnedecor};

/// Fewest independent poles for the test of cone against cylinder.
pub const LEAST_FOR_CONE: f64 = 10.0;
/// Least arc in degrees (holding 95 % of the poles) for that test. Its size is right from 150 degrees on, 0.1
/// at 120, and 1.0 at 50: the "small circle" then rings a cluster (own simulation).
pub const LEAST_CONE_ARC: f64 = 120.0;

/// Greatest root mean square misfit (a sine, 11.5 degrees) of a small circle that is worth the name: through
/// scattered poles some ring always fits better than the great circle.
pub const WORST_CIRCLE: f64 = 0.2;

/// How nearly the poles lie on one great circle (Ramsay & Huber 1987, from memory).
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Cylindricality {
    /// 90 % of the poles within 10 degrees of it.
    Cylindrical,
    /// 90 % within 20 degrees.
    SubCylindrical,
    /// Fewer.
    NonCylindrical,
}

/// A fold axis and how good it is. Angles in degrees.
#[derive(Debug, Clone, PartialEq)]
pub struct FoldAxis {
    /// e3 of the poles.
    pub axis: Axis,
    /// Its confidence cone.
    pub cone: Option<Cone>,
    /// Vollmer's cylindricity 1 - 3 S3.
    pub cylindricity: f64,
    /// Root mean square angle of the poles from the great circle.
    pub rms_misfit: f64,
    /// Class after the share of poles near the circle.
    pub class: Cylindricality,
    /// Shortest arc of the circle that holds 95 % of the poles.
    pub arc: f64,
    /// The test of cone against cylinder, where it may be made.
    pub cone_test: Option<ConeTest>,
    /// Why something is missing: sentences joined by "; ".
    pub note: String,
}

impl FoldAxis {
    /// Half-angle of the small circle on which the poles lie, where it fits better than a great circle (5 %).
    pub fn cone_half_angle(&self) -> Option<f64> {
        self.cone_test.filter(|t| t.p < 0.05).map(|t| t.circle.half_angle)
    }
}

/// F test of a small circle against a great one.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ConeTest {
    /// The small circle, by least squares in direction cosines.
    pub circle: SmallCircle,
    /// F = (n-3)(SS_great - SS_small)/SS_small, 1 and n-3 degrees of freedom.
    pub f: f64,
    /// Its p-value.
    pub p: f64,
}

/// The fold axis of poles; `None` without readings, or where e3 is arbitrary (S2 = S3).
pub fn fold_axis(sample: &Sample, confidence: f64) -> Option<FoldAxis> {
    let tensor = sample.tensor();
    let eigen = tensor.eigen()?;
    if eigen.third_undetermined() {
        return None;
    }
    let axis = eigen.axes[2];
    let units = units(sample, &sample.stations());
    let count = axis_cone::effective_units(&units);
    let mut notes = Vec::new();
    let cone = axis_cone::cone(&units, &eigen, 2, confidence);
    match cone {
        Err(NoCone::TooFew(n)) => {
            notes.push(format!("a cone needs {} stations, these count as {n:.1}", axis_cone::LEAST))
        }
        Err(NoCone::Undetermined) => notes.push("the fold axis is undetermined, within 45 degrees or more".into()),
        Ok(_) => {}
    }
    let arc = girdle_arc::arc(sample, &eigen, 0.95);
    let cone_test = if count < LEAST_FOR_CONE - 1e-9 {
        notes.push(format!("too few poles to tell a cone from a cylinder: {count:.1} of {LEAST_FOR_CONE}"));
        None
    } else if ratios::woodcock(eigen.values).0.is_none_or(|k| k >= 1.0) {
        notes.push("a cluster says nothing of a cone".into());
        None
    } else if arc < LEAST_CONE_ARC {
        notes.push(format!("an arc of {arc:.0} degrees is too short to tell a cone from a cylinder"));
        None
    } else {
        cone_if_ring(sample, count, &mut notes)
    };
    let (rms_misfit, class) = misfit(sample, axis);
    Some(FoldAxis {
        axis,
        cone: cone.ok(),
        cylindricity: ratios::cylindricity(eigen.values),
        rms_misfit,
        class,
        arc,
        cone_test,
        note: notes.join("; "),
    })
}

/// The test for the best small circle, where the poles follow that circle and go round enough of it.
fn cone_if_ring(sample: &Sample, count: f64, notes: &mut Vec<String>) -> Option<ConeTest> {
    let circle = small_circle::plane_fit(sample)?;
    let round = small_circle::coverage(sample, &circle, 0.95);
    let off = (circle.misfit / sample.len() as f64).sqrt();
    if off > WORST_CIRCLE {
        notes.push("the poles are too scattered for any small circle".into());
        return None;
    }
    if round < LEAST_CONE_ARC {
        notes.push(format!("the poles go round only {round:.0} degrees of the best small circle: no test of a cone"));
        return None;
    }
    cone_test(sample, circle, count)
}

/// F test of Cruden & Charlesworth 1972 and Gray, Geiser & Geiser 1980 (from memory), `n` independent poles.
/// The caller sees to the arc. `None` where a small circle fits without any misfit, or `n` is 3 or less.
pub fn cone_test(sample: &Sample, circle: SmallCircle, n: f64) -> Option<ConeTest> {
    let great = small_circle::great_circle_misfit(&sample.tensor());
    if circle.misfit <= 1e-12 * sample.len() as f64 {
        return None;
    }
    let f = ((n - 3.0) * (great - circle.misfit) / circle.misfit).max(0.0);
    let law = FisherSnedecor::new(1.0, n - 3.0).ok()?;
    Some(ConeTest { circle, f, p: law.sf(f) })
}

fn misfit(sample: &Sample, axis: Axis) -> (f64, Cylindricality) {
    let scale = heaviest(sample);
    let mut sums = [ExactSum::default(); 4];
    for (a, w) in sample.readings() {
        let w = w / scale;
        let off = 90.0 - a.angle_to(axis);
        let near = |limit: f64| if off <= limit { w } else { 0.0 };
        for (sum, term) in sums.iter_mut().zip([w, w * off * off, near(10.0), near(20.0)]) {
            sum.add_term(term);
        }
    }
    let [weight, squares, ten, twenty] = sums.map(ExactSum::value);
    let class = if ten >= 0.9 * weight - 1e-12 {
        Cylindricality::Cylindrical
    } else if twenty >= 0.9 * weight - 1e-12 {
        Cylindricality::SubCylindrical
    } else {
        Cylindricality::NonCylindrical
    };
    ((squares / weight).sqrt(), class)
}

/// Two limbs of a fold.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limbs {
    /// Angle between the limbs, degrees, (0, 180).
    pub interlimb: f64,
    /// Pole of the axial plane: the plane through the fold axis that halves the interlimb angle.
    pub axial_plane: Axis,
    /// Share of the weight lying in the hinge, between the limbs' poles and outside 15 degrees of either.
    pub hinge_share: f64,
    /// True where readings in the hinge say which of the two angles between the planes it is; otherwise the
    /// steeper bisecting plane was taken.
    pub hinge_seen: bool,
}

/// Poles within this many degrees of a limb's mean pole belong to the limb.
const NEAR_LIMB: f64 = 15.0;
/// A third of an arc that holds this share of all weight is peopled.
const PEOPLED: f64 = 0.04;

/// Shares of weight in the thirds of an arc between two limbs' poles.
struct Arc {
    thirds: [f64; 3],
}

impl Arc {
    fn gather(sample: &Sample, turn: &impl Fn(Axis) -> f64, from: f64, to: f64) -> Self {
        let edge = NEAR_LIMB.min((to - from) / 3.0);
        let (low, width) = (from + edge, to - from - 2.0 * edge);
        let scale = heaviest(sample);
        let (mut thirds, mut total) = ([ExactSum::default(); 3], ExactSum::default());
        for (a, w) in sample.readings() {
            let place = (turn(a) - low) / width;
            if (0.0..1.0).contains(&place) {
                thirds[(place * 3.0) as usize].add_term(w / scale);
            }
            total.add_term(w / scale);
        }
        Self { thirds: thirds.map(|t| t.value() / total.value()) }
    }
    fn share(&self) -> f64 {
        self.thirds.iter().sum()
    }
}

/// Interlimb angle and axial plane from the mean poles of two limbs of a fold with axis `axis` (the angle is
/// 180 degrees minus the arc of poles through the hinge). `None` where the poles coincide.
pub fn limbs(sample: &Sample, axis: Axis, poles: [Axis; 2]) -> Option<Limbs> {
    let normal = axis.vector();
    let e = poles[0].vector() - normal * normal.dot(&poles[0].vector());
    let e = e.try_normalize(1e-9)?;
    let f = normal.cross(&e);
    let turn = |a: Axis| a.vector().dot(&f).atan2(a.vector().dot(&e)).to_degrees().rem_euclid(180.0);
    let second = turn(poles[1]);
    if !(1e-9..=180.0 - 1e-9).contains(&second) {
        return None;
    }
    let inner = Arc::gather(sample, &turn, 0.0, second);
    let outer = Arc::gather(sample, &turn, second, 180.0);
    let at = |degrees: f64| {
        let (s, c) = degrees.to_radians().sin_cos();
        let v = e * c + f * s;
        Axis::new(v.x, v.y, v.z).ok()
    };
    // The hinge's pole halves one of the two arcs; the pole of the axial plane halves the other.
    let halves = [at(second / 2.0)?, at(second / 2.0 + 90.0)?];
    let (short, long) = if second <= 90.0 { (&inner, &outer) } else { (&outer, &inner) };
    // Limbs whose poles are close overlap between them: there only a long arc peopled throughout is a hinge.
    let close = second.min(180.0 - second) < 3.0 * NEAR_LIMB;
    let (hinge_seen, through_long) = if close {
        let peopled = long.thirds.iter().all(|t| *t >= PEOPLED);
        (peopled || short.share() > 0.02, peopled)
    } else {
        ((inner.share() - outer.share()).abs() > 0.02, long.share() > short.share())
    };
    let through_first =
        if hinge_seen { through_long == (second > 90.0) } else { halves[1].plunge() <= halves[0].plunge() };
    let (arc, axial_plane, share) =
        if through_first { (second, halves[1], inner.share()) } else { (180.0 - second, halves[0], outer.share()) };
    Some(Limbs { interlimb: 180.0 - arc, axial_plane, hinge_share: share, hinge_seen })
}

/// The same where sets were found: the two heaviest whose means lie within 20 degrees of the great circle.
pub fn limbs_of_sets(sample: &Sample, axis: Axis, sets: &Sets) -> Option<Limbs> {
    let mut on_circle = sets.sets.iter().map(|s| s.eigen.axes[0]).filter(|m| 90.0 - m.angle_to(axis) <= 20.0);
    limbs(sample, axis, [on_circle.next()?, on_circle.next()?])
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fabric::Kind;
    use approx::assert_abs_diff_eq;

    fn pole(dip_direction: f64, dip: f64) -> Axis {
        Axis::from_trend_plunge(dip_direction + 180.0, 90.0 - dip)
    }

    // Geometry: limbs dipping 60 degrees either way about a level north-south axis enclose 60 degrees.
    #[test]
    fn an_upright_fold() {
        let north = Axis::from_trend_plunge(0.0, 0.0);
        let both = [pole(90.0, 60.0), pole(270.0, 60.0)];
        let hinge = [pole(90.0, 60.0), pole(270.0, 60.0), pole(90.0, 20.0), pole(270.0, 5.0)];
        for axes in [&both[..], &hinge[..]] {
            let l = limbs(&Sample::new(axes, Kind::Planar), north, both).unwrap();
            assert_abs_diff_eq!(l.interlimb, 60.0, epsilon = 1e-9);
            assert_abs_diff_eq!(l.axial_plane.plunge(), 0.0, epsilon = 1e-9);
            assert_eq!(l.hinge_seen, axes.len() > 2);
        }
        // Open limbs whose poles are 30 degrees apart, with one stray bed across: still an open fold.
        let open = [pole(90.0, 15.0), pole(270.0, 15.0)];
        let mut beds = [pole(90.0, 14.0), pole(270.0, 16.0)].repeat(12);
        beds.push(pole(90.0, 80.0));
        let l = limbs(&Sample::new(&beds, Kind::Planar), north, open).unwrap();
        assert_abs_diff_eq!(l.interlimb, 150.0, epsilon = 1e-9);
        // Vertical beds in the hinge make it a recumbent fold of 120 degrees.
        let lying = [pole(90.0, 60.0), pole(270.0, 60.0), pole(90.0, 90.0), pole(270.0, 85.0)];
        let l = limbs(&Sample::new(&lying, Kind::Planar), north, both).unwrap();
        assert_abs_diff_eq!(l.interlimb, 120.0, epsilon = 1e-9);
        assert_abs_diff_eq!(l.axial_plane.plunge(), 90.0, epsilon = 1e-9);
    }

    #[test]
    fn clusters_get_no_cone() {
        let axes: Vec<Axis> = (0..40).map(|i| pole(f64::from(i * 9), 20.0)).collect();
        let f = fold_axis(&Sample::new(&axes, Kind::Planar), 0.95);
        assert!(f.is_none_or(|f| f.cone_test.is_none()));
        let tight: Vec<Axis> = (0..40).map(|i| pole(90.0 + f64::from(i % 7), 40.0 + f64::from(i % 5))).collect();
        let f = fold_axis(&Sample::new(&tight, Kind::Planar), 0.95).unwrap();
        assert_eq!((f.cone_test, f.cone_half_angle()), (None, None));
        assert!(f.note.contains("cluster"), "{}", f.note);
    }
}
