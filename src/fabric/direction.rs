//! Directions with a sense: slip vectors, facings, currents.

use super::fisher::Resultant;
use super::kent::{self, Kent};
use super::sample::{Kind, Sample, SampleError};
use super::summary::{Fabric, FabricOptions, summarise};
use super::uniformity::chi_squared_tail;
use super::{concentration, shape::Shape};
use crate::orientation::{Axis, AxisError, Plane, Polarity};
use nalgebra::Vector3;

/// A unit vector with a sense, frame east-north-up.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Direction(Vector3<f64>);

impl Direction {
    /// From any vector (east, north, up) of finite length above 0.
    pub fn new(east: f64, north: f64, up: f64) -> Result<Self, AxisError> {
        let v = Axis::new(east, north, up)?.vector();
        let largest = east.abs().max(north.abs()).max(up.abs());
        let along = v.dot(&Vector3::new(east / largest, north / largest, up / largest));
        Ok(Self(if along < 0.0 { -v } else { v }))
    }
    /// From trend and plunge in degrees, plunge negative where the arrow points upward.
    pub fn from_trend_plunge(trend: f64, plunge: f64) -> Self {
        let v = Axis::from_trend_plunge(trend, plunge).vector();
        let (t, p) = (trend.to_radians(), plunge.to_radians());
        let arrow = Vector3::new(p.cos() * t.sin(), p.cos() * t.cos(), -p.sin());
        Self(if v.dot(&arrow) < 0.0 { -v } else { v })
    }
    /// Towards which the beds of a plane young: the upward pole where upright, the downward one where
    /// overturned; `None` where nobody said.
    pub fn facing(plane: Plane, polarity: Polarity) -> Option<Self> {
        let down = plane.pole().vector();
        match polarity {
            Polarity::Upright => Some(Self(-down)),
            Polarity::Overturned => Some(Self(down)),
            Polarity::Unknown => None,
        }
    }
    /// The unit vector (east, north, up).
    pub fn vector(self) -> Vector3<f64> {
        self.0
    }
    /// The same without its sense.
    pub fn axis(self) -> Axis {
        Axis::new(self.0.x, self.0.y, self.0.z).expect("a unit vector has a direction")
    }
    /// Trend in degrees, [0, 360): where the arrow points, also when it points upward.
    pub fn trend(self) -> f64 {
        crate::orientation::wrap_degrees(self.0.x.atan2(self.0.y).to_degrees())
    }
    /// Plunge in degrees, [-90, 90], negative upward.
    pub fn plunge(self) -> f64 {
        (-self.0.z).atan2(self.0.x.hypot(self.0.y)).to_degrees()
    }
    /// Angle to another direction, degrees, [0, 180].
    pub fn angle_to(self, other: Direction) -> f64 {
        self.0.cross(&other.0).norm().atan2(self.0.dot(&other.0)).to_degrees()
    }
}

/// Directions with weights and stations, as [`Sample`] holds axes.
#[derive(Debug, Clone, Copy)]
pub struct Directed<'a> {
    /// The directions.
    pub directions: &'a [Direction],
    /// A weight each, or none where all are equal.
    pub weights: Option<&'a [f64]>,
    /// A station each, or none where every reading has its own.
    pub stations: Option<&'a [u32]>,
    /// Poles (facings) or lines.
    pub kind: Kind,
}

/// What the sense adds to a fabric.
#[derive(Debug, Clone, PartialEq)]
pub struct DirectedFabric {
    /// The statistics of the axes; `resultant`, `fisher_kappa` and `fisher_alpha95` are of the directions.
    pub fabric: Fabric,
    /// The mean direction; `None` where the directions are not shown to prefer one (Rayleigh's test, 5 %).
    pub mean: Option<Direction>,
    /// Rayleigh's test of uniformity against one preferred direction.
    pub rayleigh_p: Option<f64>,
    /// Confidence interval of Fisher's kappa.
    pub kappa_interval: Option<(f64, f64)>,
    /// How many directions point away from the mean (more than 90 degrees off).
    pub opposed: usize,
    /// Kent's distribution, by maximum likelihood; only where there is a mean.
    pub kent: Option<Kent>,
}

/// Every statistic of directions. Errors only where columns do not fit each other.
pub fn summarise_directed(sample: &Directed, options: &FabricOptions) -> Result<DirectedFabric, SampleError> {
    let axes: Vec<Axis> = sample.directions.iter().map(|d| d.axis()).collect();
    let mut axial = Sample::new(&axes, sample.kind);
    if let Some(w) = sample.weights {
        axial = axial.weighted(w)?;
    }
    if let Some(s) = sample.stations {
        axial = axial.at_stations(s)?;
    }
    let mut fabric = summarise(&axial, options);
    let scale = super::sample::heaviest(&axial);
    let all = Resultant::of(sample.directions.iter().enumerate().map(|(i, d)| (d.vector(), axial.weight(i) / scale)));
    let votes = votes(sample, &axial, scale);
    let by_station = Resultant::of(votes.iter().copied());
    let mut result = DirectedFabric {
        mean: None,
        rayleigh_p: (by_station.n >= 3.0 - 1e-9).then(|| rayleigh_p(&by_station)),
        kappa_interval: None,
        opposed: 0,
        kent: None,
        fabric: fabric.clone(),
    };
    (fabric.resultant, fabric.fisher_kappa, fabric.fisher_alpha95) = (None, None, None);
    let preferred = result.rayleigh_p.is_some_and(|p| p < 0.05);
    let mut notes = Vec::new();
    if fabric.shape == Shape::TooFew {
        notes.push("no mean direction of so few".to_string());
    } else if !preferred {
        notes.push("the directions are not shown to prefer one: no mean direction".into());
    }
    if let (true, Some(mean)) = (preferred && fabric.shape != Shape::TooFew, all.mean) {
        result.mean = Some(Direction(mean));
        result.opposed = sample.directions.iter().filter(|d| d.vector().dot(&mean) < 0.0).count();
        if result.opposed > 0 {
            notes.push(format!("{} of {} point away from the mean direction", result.opposed, fabric.n));
        }
        if fabric.shape.has_mean() {
            fabric.resultant = Some(all.length);
            fabric.fisher_kappa = all.kappa();
            fabric.fisher_alpha95 = by_station.alpha(0.95);
            result.kappa_interval = concentration::interval(&by_station, options.confidence);
            result.kent = kent::fit(&votes);
        }
    }
    notes.insert(0, std::mem::take(&mut fabric.note));
    notes.retain(|n| !n.is_empty());
    fabric.note = notes.join("; ");
    result.fabric = fabric;
    Ok(result)
}

/// One mean direction per station, weighted by the station's mean weight; in an order that rows do not decide.
fn votes(sample: &Directed, axial: &Sample, scale: f64) -> Vec<(Vector3<f64>, f64)> {
    let stations = axial.stations();
    let mut votes: Vec<(Vector3<f64>, f64)> = stations
        .groups()
        .filter_map(|group| {
            let members = group.iter().map(|&i| i as usize);
            let own = Resultant::of(members.clone().map(|i| (sample.directions[i].vector(), axial.weight(i) / scale)));
            let weight: crate::orientation::ExactSum = members.map(|i| axial.weight(i) / scale).collect();
            Some((own.mean?, weight.value() / group.len() as f64))
        })
        .collect();
    votes.sort_unstable_by(|(a, v), (b, w)| {
        a.x.total_cmp(&b.x).then(a.y.total_cmp(&b.y)).then(a.z.total_cmp(&b.z)).then(v.total_cmp(w))
    });
    votes
}

/// Rayleigh's test: S = 3 R^2 / n; up to 25 directions the exact law of R (Watson 1956), beyond S corrected,
/// (1 - 1/(2n)) S + S^2/(10 n), chi-squared with 3 degrees of freedom (Mardia & Jupp 2000, from memory).
pub fn rayleigh_p(r: &Resultant) -> f64 {
    if r.n <= 0.0 {
        return 1.0;
    }
    let whole = r.n.round();
    if (r.n - whole).abs() < 1e-9 && whole <= 25.0 {
        return concentration::resultant_tail(whole as u32, r.length);
    }
    let s = 3.0 * r.length * r.length / r.n;
    chi_squared_tail(3.0, (1.0 - 0.5 / r.n) * s + s * s / (10.0 * r.n))
}
