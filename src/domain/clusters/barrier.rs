//! Lines that no domain crosses.

use super::sites::Sites;
use super::{Barriers, GrowError};
use geo::{Coord, Intersects, Line, LineString};
use rayon::prelude::*;
use rstar::{AABB, RTree, RTreeObject};

struct Segment(Line<f64>);

impl RTreeObject for Segment {
    type Envelope = AABB<[f64; 2]>;
    fn envelope(&self) -> Self::Envelope {
        envelope(&self.0)
    }
}

fn envelope(line: &Line<f64>) -> AABB<[f64; 2]> {
    AABB::from_corners([line.start.x, line.start.y], [line.end.x, line.end.y])
}

/// The barriers' segments in the frame of the sites.
pub(super) struct Fence(RTree<Segment>);

impl Fence {
    /// A line of one vertex, or whose vertices are all one, separates nothing and is counted as idle; so is
    /// one that stays outside the bounding box of the sites.
    pub(super) fn new(barriers: &[LineString<f64>], sites: &Sites) -> Result<(Self, Barriers), GrowError> {
        let mut used = Barriers { lines: barriers.len(), ..Barriers::default() };
        let corners = sites.at.iter().fold([0; 2], |[x, y], at| [x.max(at[0]), y.max(at[1])]);
        let area = AABB::from_corners([0.0, 0.0], [corners[0] as f64, corners[1] as f64]);
        let mut segments = Vec::new();
        for (barrier, line) in barriers.iter().enumerate() {
            if !line.coords().all(|c| c.x.is_finite() && c.y.is_finite()) {
                return Err(GrowError::BarrierNotFinite { barrier });
            }
            let placed: Vec<Coord<f64>> = line.coords().map(|&c| sites.place(c)).collect();
            let before = segments.len();
            for pair in placed.windows(2).filter(|pair| pair[0] != pair[1]) {
                let segment = Segment(Line::new(pair[0], pair[1]));
                if rstar::Envelope::intersects(&segment.envelope(), &area) {
                    segments.push(segment);
                }
            }
            used.idle += usize::from(segments.len() == before);
        }
        Ok((Self(RTree::bulk_load(segments)), used))
    }

    /// For each edge between sites, whether it meets a barrier (exact predicates; touching counts).
    pub(super) fn crossed(&self, edges: &[[u32; 2]], sites: &Sites) -> Vec<bool> {
        if self.0.size() == 0 {
            return vec![false; edges.len()];
        }
        edges
            .par_iter()
            .map(|&[a, b]| {
                let edge = Line::new(sites.coord(a as usize), sites.coord(b as usize));
                self.0.locate_in_envelope_intersecting(&envelope(&edge)).any(|s| s.0.intersects(&edge))
            })
            .collect()
    }
}
