//! Orientation sets: which readings belong together, and how many groups there are.

use super::mixture::{self, Data, Mixture};
use super::sample::Sample;
use super::{bingham, fisher};
use crate::orientation::{Axis, Eigen};
use nalgebra::{Matrix3, SymmetricEigen, Vector3};
use rayon::prelude::*;

/// Fewest effective readings for sets to be looked for, and fewest in one to trust it (judgement).
pub const LEAST: f64 = 20.0;
/// See [`LEAST`].
pub const TRUSTED: usize = 15;
/// Fewest readings that are called a set.
pub const LEAST_IN_SET: usize = 5;
/// Most sets looked for.
pub const MOST_SETS: usize = 7;

/// Most sets that may be asked for.
pub const LARGEST_COUNT: usize = 32;

/// Readings used at most in the search; all of them then take part in the final fit.
const MOST_SEARCHED: usize = 2000;
/// Parts are one set where the density between them stays above this share of the lesser peak.
const DIP: f64 = 0.7;

/// Means nearer than this, degrees, belong to one set: surfaces of one set undulate as much (judgement).
const LEAST_APART: f64 = 15.0;
/// A difference in BIC beyond doubt (Kass & Raftery 1995 call 10 very strong; from memory).
const FAR_BEHIND: f64 = 20.0;

/// How many sets.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SetCount {
    /// As many as Schwarz's criterion supports.
    Auto,
    /// This many.
    Given(usize),
}

/// One set.
#[derive(Debug, Clone, PartialEq)]
pub struct AxisSet {
    /// How many readings.
    pub n: usize,
    /// Their share of all weight.
    pub share: f64,
    /// Eigenvalues and axes of the members; the first axis is the set's mean.
    pub eigen: Eigen,
    /// Fisher's kappa of the members turned to the mean's side, (n-1)/(n-R).
    pub fisher_kappa: Option<f64>,
    /// Fisher's cone of the mean, degrees, stations as units.
    pub fisher_alpha95: Option<f64>,
    /// Why something is missing or weak.
    pub note: String,
}

/// The sets of a sample.
#[derive(Debug, Clone, PartialEq)]
pub struct Sets {
    /// The sets, the heaviest first.
    pub sets: Vec<AxisSet>,
    /// Position of each reading's set in `sets`; `None` for a reading that is more likely background.
    pub member: Vec<Option<usize>>,
    /// What was found, or why nothing.
    pub note: String,
}

impl Sets {
    fn none(n: usize, note: impl Into<String>) -> Self {
        Self { sets: Vec::new(), member: vec![None; n], note: note.into() }
    }
}

/// Sets of a sample: a mixture of Watson parts (one per set, axial) and a uniform background (after Sra & Karp
/// 2013 and Peel, Whiten & McLachlan 2001, from memory).
///
/// With [`SetCount::Auto`] the number of parts is the one of least BIC, parts without a gap in the density
/// between them are one set, and a single Bingham distribution (which may be a girdle or an oval cluster)
/// with background is preferred where its BIC is less: then there are no sets to tell apart, and none are returned.
pub fn sets(sample: &Sample, count: SetCount, seed: u64) -> Sets {
    let n = sample.tensor().effective_count();
    if count == SetCount::Given(0) || sample.is_empty() {
        return Sets::none(sample.len(), "no sets asked for");
    }
    if count == SetCount::Auto && n < LEAST - 1e-9 {
        return Sets::none(sample.len(), format!("sets need {LEAST} readings, these count as {n:.1}"));
    }
    if let SetCount::Given(k) = count
        && k > LARGEST_COUNT
    {
        return Sets::none(sample.len(), format!("{k} sets are more than the {LARGEST_COUNT} that can be told apart"));
    }
    if let SetCount::Given(k) = count
        && sample.len() < LEAST_IN_SET * k
    {
        return Sets::none(
            sample.len(),
            format!("{k} sets need {} readings, there are {}", LEAST_IN_SET * k, sample.len()),
        );
    }
    let data = ordered(sample, n);
    let stride = data.len().div_ceil(MOST_SEARCHED).max(1);
    let searched: Data = data.iter().step_by(stride).map(|&(v, w)| (v, w * stride as f64)).collect();
    let (chosen, groups) = match count {
        SetCount::Given(k) => {
            let m = mixture::finish(&searched, mixture::fit(&searched, k, seed));
            let own = (0..m.parts.len()).collect();
            (m, own)
        }
        SetCount::Auto => {
            let most = MOST_SETS.min((n / 10.0) as usize);
            let single = bingham_bic(&searched, n);
            let mut best = mixture::fit(&searched, 0, seed);
            let mut worse = 0;
            for k in 1..=most {
                let m = mixture::fit(&searched, k, seed);
                if m.bic(n) < best.bic(n) {
                    best = m;
                    worse = 0;
                } else {
                    worse += 1;
                    // A second part may help only together with a third; two failures in a row end the search.
                    if worse == 2 && k > 2 {
                        break;
                    }
                }
                // Two parts that fall this far behind one Bingham distribution are not made good by a third.
                if k == 2 && single + FAR_BEHIND < best.bic(n) {
                    break;
                }
            }
            if best.parts.len() < 2 || single <= best.bic(n) {
                return Sets::none(sample.len(), "one maximum or girdle fits as well as several sets: no sets");
            }
            let best = mixture::finish(&searched, best);
            let groups = joined(&best);
            (best, groups)
        }
    };
    let chosen = if stride > 1 { mixture::refine(&data, chosen) } else { chosen };
    let result = assigned(sample, &chosen, &groups);
    if count == SetCount::Auto && result.sets.len() < 2 {
        return Sets::none(sample.len(), "one maximum: no sets");
    }
    result
}

/// Vectors with weights summing to `n`, in an order that rows do not decide.
fn ordered(sample: &Sample, n: f64) -> Data {
    let scale = n / sample.tensor().weight();
    let mut data: Data = sample.readings().map(|(a, w)| (a.vector(), w * scale)).collect();
    data.par_sort_unstable_by(|(a, v), (b, w)| {
        a.z.total_cmp(&b.z).then(a.y.total_cmp(&b.y)).then(a.x.total_cmp(&b.x)).then(v.total_cmp(w))
    });
    data
}

/// BIC of one Bingham distribution with a uniform background: six parameters.
fn bingham_bic(data: &Data, n: f64) -> f64 {
    let mut share = 0.9;
    let mut responsibilities = vec![1.0; data.len()];
    let mut log_likelihood = f64::NEG_INFINITY;
    for _ in 0..50 {
        let (mut weight, mut tensor) = (0.0, Matrix3::<f64>::zeros());
        for ((v, w), r) in data.iter().zip(&responsibilities) {
            weight += w * r;
            tensor += v * v.transpose() * (w * r);
        }
        let SymmetricEigen { eigenvalues, eigenvectors } = (tensor / weight).symmetric_eigen();
        let mut order = [0, 1, 2];
        order.sort_by(|&a, &b| eigenvalues[b].total_cmp(&eigenvalues[a]));
        // A compass is no better than a degree or so; the floor keeps a plane of axes from an infinite fit.
        let floored = order.map(|i| eigenvalues[i].max(2e-4));
        let total: f64 = floored.iter().sum();
        let Some(fit) = bingham::fit(floored.map(|s| s / total)) else { return f64::INFINITY };
        let (e2, e3) = (eigenvectors.column(order[1]), eigenvectors.column(order[2]));
        let (mut next, mut taken) = (0.0, 0.0);
        for ((v, w), r) in data.iter().zip(&mut responsibilities) {
            let exponent = fit.k2 * e2.dot(v).powi(2) + fit.k3 * e3.dot(v).powi(2) - fit.log_constant;
            let (own, other) = (share * exponent.exp(), 1.0 - share);
            *r = own / (own + other);
            next += w * (own + other).ln();
            taken += w * *r;
        }
        share = (taken / data.iter().map(|d| d.1).sum::<f64>()).clamp(1e-6, 1.0 - 1e-6);
        let gained = next - log_likelihood;
        log_likelihood = next;
        if gained.abs() < 1e-7 * n {
            break;
        }
    }
    6.0 * n.ln() - 2.0 * log_likelihood
}

/// The set of each part: parts are joined where the density does not dip between them on either way round.
fn joined(m: &Mixture) -> Vec<usize> {
    const STEPS: usize = 24;
    let mut group: Vec<usize> = (0..m.parts.len()).collect();
    let lowest = |a: &Vector3<f64>, b: &Vector3<f64>| {
        let angle = a.dot(b).clamp(-1.0, 1.0).acos();
        (1..STEPS)
            .map(|k| {
                let t = k as f64 / STEPS as f64;
                let p = a * ((1.0 - t) * angle).sin() + b * (t * angle).sin();
                p.try_normalize(1e-9).map_or(f64::INFINITY, |p| m.density(&p))
            })
            .fold(f64::INFINITY, f64::min)
    };
    for i in 0..m.parts.len() {
        for j in 0..i {
            let (a, b) = (m.parts[i].mean, m.parts[j].mean);
            let between = lowest(&a, &b).max(lowest(&a, &-b));
            let near = a.dot(&b).abs() > LEAST_APART.to_radians().cos();
            if near || between > DIP * m.density(&a).min(m.density(&b)) {
                let (keep, drop) = (group[j].min(group[i]), group[j].max(group[i]));
                group.iter_mut().filter(|g| **g == drop).for_each(|g| *g = keep);
            }
        }
    }
    group
}

/// Members of each set by the likeliest part (parts of one set together), then the sets' own statistics.
fn assigned(sample: &Sample, m: &Mixture, groups: &[usize]) -> Sets {
    let likeliest = |a: &Axis| {
        let v = a.vector();
        let mut sums = [0.0; LARGEST_COUNT];
        for (part, &g) in m.parts.iter().zip(groups) {
            sums[g] += part.density(&v);
        }
        let best = (0..m.parts.len()).reduce(|a, b| if sums[b] > sums[a] { b } else { a })?;
        (sums[best] > m.uniform).then_some(best)
    };
    let raw: Vec<Option<usize>> = sample.axes().par_iter().map(likeliest).collect();
    let total = sample.tensor().weight();
    let mut found: Vec<(usize, AxisSet)> = (0..m.parts.len())
        .filter_map(|g| {
            let members: Vec<usize> = (0..raw.len()).filter(|&i| raw[i] == Some(g)).collect();
            (members.len() >= LEAST_IN_SET).then(|| described(sample, &members, total)).flatten().map(|s| (g, s))
        })
        .collect();
    found.sort_by(|(_, a), (_, b)| {
        let place = |s: &AxisSet| s.eigen.axes[0].vector();
        let (p, q) = (place(a), place(b));
        b.share.total_cmp(&a.share).then(p.z.total_cmp(&q.z)).then(p.y.total_cmp(&q.y)).then(p.x.total_cmp(&q.x))
    });
    let position = |g: usize| found.iter().position(|(own, _)| *own == g);
    let member: Vec<Option<usize>> = raw.iter().map(|g| g.and_then(position)).collect();
    let background = member.iter().filter(|m| m.is_none()).count();
    let note = format!("{} sets, {background} readings in none", found.len());
    Sets { sets: found.into_iter().map(|(_, s)| s).collect(), member, note }
}

fn described(sample: &Sample, members: &[usize], total: f64) -> Option<AxisSet> {
    let part = sample.part(members);
    let own = part.as_sample();
    let tensor = own.tensor();
    let eigen = tensor.eigen()?;
    let all = fisher::axial_resultant(&own, eigen.axes[0]);
    let votes = fisher::station_resultant(&own, &own.stations(), eigen.axes[0]);
    let mut notes = Vec::new();
    if members.len() < TRUSTED {
        notes.push(format!("weak: {} readings, fewer than {TRUSTED}", members.len()));
    }
    let fisher_alpha95 = votes.alpha(0.95);
    if fisher_alpha95.is_none() {
        notes.push(format!("alpha95 needs 3 stations, these count as {:.1}", votes.n));
    }
    Some(AxisSet {
        n: members.len(),
        share: tensor.weight() / total,
        eigen,
        fisher_kappa: all.kappa(),
        fisher_alpha95,
        note: notes.join("; "),
    })
}
