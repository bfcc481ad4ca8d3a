//! One sample: the axes of one structure in one domain, with weights and the station of each.

use crate::orientation::{Axis, OrientationTensor};
pub use crate::station::Kind;
use nalgebra::Vector3;
use std::borrow::Cow;
use thiserror::Error;

/// Why columns do not make a sample.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum SampleError {
    /// Columns of unequal length.
    #[error("{axes} axes but {other} {column}")]
    Length {
        /// How many axes.
        axes: usize,
        /// Name of the other column.
        column: &'static str,
        /// Its length.
        other: usize,
    },
    /// A weight that cannot be one.
    #[error("weight {weight} of reading {index} is not in (0, 1000000]")]
    Weight {
        /// Position in the sample.
        index: usize,
        /// The number offered.
        weight: f64,
    },
}

/// Axes with weights and stations. The order of readings means nothing: every statistic of a shuffled
/// sample has the same bits.
#[derive(Debug, Clone)]
pub struct Sample<'a> {
    axes: &'a [Axis],
    weights: Option<&'a [f64]>,
    stations: Option<&'a [u32]>,
    kind: Kind,
}

impl<'a> Sample<'a> {
    /// The heaviest weight allowed.
    pub const HEAVIEST: f64 = 1e6;

    /// Axes of equal weight, each from its own station.
    pub fn new(axes: &'a [Axis], kind: Kind) -> Self {
        Self { axes, weights: None, stations: None, kind }
    }

    /// The same with a weight per reading, in (0, 1e6]. Only their ratios matter.
    pub fn weighted(mut self, weights: &'a [f64]) -> Result<Self, SampleError> {
        self.same_length("weights", weights.len())?;
        if let Some((index, &weight)) = weights.iter().enumerate().find(|(_, w)| !(**w > 0.0 && **w <= Self::HEAVIEST))
        {
            return Err(SampleError::Weight { index, weight });
        }
        self.weights = Some(weights);
        Ok(self)
    }

    /// The same with a station per reading: equal numbers are one station.
    pub fn at_stations(mut self, stations: &'a [u32]) -> Result<Self, SampleError> {
        self.same_length("stations", stations.len())?;
        self.stations = Some(stations);
        Ok(self)
    }

    /// The same readings, each as if from its own station.
    pub fn apart(mut self) -> Self {
        self.stations = None;
        self
    }

    fn same_length(&self, column: &'static str, other: usize) -> Result<(), SampleError> {
        if other == self.axes.len() {
            Ok(())
        } else {
            Err(SampleError::Length { axes: self.axes.len(), column, other })
        }
    }

    /// How many readings.
    pub fn len(&self) -> usize {
        self.axes.len()
    }
    /// True where there are none.
    pub fn is_empty(&self) -> bool {
        self.axes.is_empty()
    }
    /// Poles or lines.
    pub fn kind(&self) -> Kind {
        self.kind
    }
    /// The axes.
    pub fn axes(&self) -> &'a [Axis] {
        self.axes
    }
    /// The weight of a reading.
    pub fn weight(&self, index: usize) -> f64 {
        self.weights.map_or(1.0, |w| w[index])
    }
    /// Every axis with its weight.
    pub fn readings(&self) -> impl Iterator<Item = (Axis, f64)> + Clone + '_ {
        self.axes.iter().enumerate().map(|(i, &a)| (a, self.weight(i)))
    }
    /// The weighted tensor of all readings.
    pub fn tensor(&self) -> OrientationTensor {
        let mut tensor = OrientationTensor::default();
        for (axis, weight) in self.readings() {
            tensor.add(axis, weight);
        }
        tensor
    }

    /// Some of the readings, copied.
    pub fn part(&self, members: &[usize]) -> Part {
        Part {
            axes: members.iter().map(|&i| self.axes[i]).collect(),
            weights: self.weights.map(|w| members.iter().map(|&i| w[i]).collect()),
            stations: self.stations.map(|s| members.iter().map(|&i| s[i]).collect()),
            kind: self.kind,
        }
    }

    /// The readings of each station. Within and between stations the order is arbitrary.
    pub fn stations(&self) -> Stations {
        let mut order: Vec<u32> = (0..self.axes.len() as u32).collect();
        let Some(stations) = self.stations else {
            return Stations { starts: (0..=self.axes.len()).collect(), order };
        };
        order.sort_unstable_by_key(|&i| stations[i as usize]);
        let mut starts: Vec<usize> = (0..order.len())
            .filter(|&k| k == 0 || stations[order[k] as usize] != stations[order[k - 1] as usize])
            .collect();
        starts.push(order.len());
        Stations { starts, order }
    }
}

/// A sample that owns its columns.
#[derive(Debug, Clone)]
pub struct Part {
    axes: Vec<Axis>,
    weights: Option<Vec<f64>>,
    stations: Option<Vec<u32>>,
    kind: Kind,
}

impl Part {
    /// The sample they are.
    pub fn as_sample(&self) -> Sample<'_> {
        Sample {
            axes: &self.axes,
            weights: self.weights.as_deref(),
            stations: self.stations.as_deref(),
            kind: self.kind,
        }
    }
}

/// Readings grouped by station.
#[derive(Debug, Clone)]
pub struct Stations {
    order: Vec<u32>,
    starts: Vec<usize>,
}

impl Stations {
    /// How many stations.
    pub fn len(&self) -> usize {
        self.starts.len() - 1
    }
    /// True where there are none.
    pub fn is_empty(&self) -> bool {
        self.len() == 0
    }
    /// Positions in the sample, station by station.
    pub fn groups(&self) -> impl Iterator<Item = &[u32]> + '_ {
        self.starts.windows(2).map(|w| &self.order[w[0]..w[1]])
    }
}

/// What the readings of one station add to the tensor: a unit of every test and interval, since readings at
/// one station are no independent witnesses of a domain.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Unit {
    /// Weighted sum of x x' over the station: ee, en, eu, nn, nu, uu.
    pub moments: [f64; 6],
    /// Sum of the station's weights, the trace of the moments.
    pub weight: f64,
}

impl Unit {
    /// a' M b.
    pub fn form(&self, a: &Vector3<f64>, b: &Vector3<f64>) -> f64 {
        let [ee, en, eu, nn, nu, uu] = self.moments;
        a.x * (ee * b.x + en * b.y + eu * b.z)
            + a.y * (en * b.x + nn * b.y + nu * b.z)
            + a.z * (eu * b.x + nu * b.y + uu * b.z)
    }
    /// Squared Frobenius norm of the deviator M - (trace M / 3) I.
    pub fn deviator_squared(&self) -> f64 {
        let [ee, en, eu, nn, nu, uu] = self.moments;
        let m = self.weight / 3.0;
        (ee - m).powi(2) + (nn - m).powi(2) + (uu - m).powi(2) + 2.0 * (en * en + eu * eu + nu * nu)
    }
}

/// One unit per station, weights scaled so that the heaviest reading counts 1.
pub fn units(sample: &Sample, stations: &Stations) -> Vec<Unit> {
    let scale = heaviest(sample);
    stations
        .groups()
        .map(|group| {
            let mut tensor = OrientationTensor::default();
            for &i in group {
                tensor.add(sample.axes[i as usize], sample.weight(i as usize) / scale);
            }
            Unit { moments: tensor.moments(), weight: tensor.weight() }
        })
        .collect()
}

/// The greatest weight of a sample, 1 where all are equal or none is there.
pub(super) fn heaviest(sample: &Sample) -> f64 {
    match sample.weights.map(Cow::Borrowed) {
        Some(w) if !w.is_empty() => w.iter().copied().fold(0.0, f64::max),
        _ => 1.0,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn axes(n: usize) -> Vec<Axis> {
        (0..n).map(|i| Axis::from_trend_plunge(i as f64 * 31.0, (i * 13 % 90) as f64)).collect()
    }

    #[test]
    fn columns_that_do_not_fit_are_refused_with_their_values() {
        let a = axes(3);
        let s = Sample::new(&a, Kind::Planar);
        assert_eq!(
            s.clone().weighted(&[1.0]).unwrap_err(),
            SampleError::Length { axes: 3, column: "weights", other: 1 }
        );
        assert!(s.clone().at_stations(&[1, 2]).is_err());
        for bad in [0.0, -1.0, f64::NAN, f64::INFINITY, 2e6] {
            assert!(matches!(s.clone().weighted(&[1.0, bad, 1.0]), Err(SampleError::Weight { index: 1, .. })));
        }
    }

    #[test]
    fn stations_gather_their_readings() {
        let a = axes(6);
        let s = Sample::new(&a, Kind::Linear).at_stations(&[7, 3, 7, 9, 3, 7]).unwrap();
        let mut sizes: Vec<usize> = s.stations().groups().map(<[u32]>::len).collect();
        sizes.sort_unstable();
        assert_eq!(sizes, [1, 2, 3]);
        assert_eq!(Sample::new(&a, Kind::Linear).stations().len(), 6);
        assert!(Sample::new(&[], Kind::Linear).stations().is_empty());
        let total: f64 = units(&s, &s.stations()).iter().map(|u| u.weight).sum();
        assert_eq!(total, 6.0);
    }
}
