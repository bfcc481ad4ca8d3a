//! The spatial index of a layer, packed in bulk into the tables behind SQLite's R*Tree module.
//!
//! Nodes are filled by sort-tile-recursive packing (Leutenegger, Lopez & Edgington 1997, "STR: A simple and efficient
//! algorithm for R-tree packing"). Layout of a node: SQLite, ext/rtree/rtree.c ("Database Format of R-Tree Tables"):
//! two bytes of depth (meant in the root alone), two of cell count, then cells of an 8-byte id and the four
//! coordinates x min, x max, y min, y max as 4-byte floats, all big-endian.

use crate::table::Shapes;
use geo::BoundingRect;
use geo_types::{Coord, Geometry, Rect};
use rayon::slice::ParallelSliceMut;

/// The smallest box around a shape.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Bounds {
    pub min: Coord<f64>,
    pub max: Coord<f64>,
}

impl Bounds {
    /// Of a geometry; nothing for an empty one.
    pub fn of(geometry: &Geometry<f64>) -> Option<Self> {
        let rect: Rect<f64> = geometry.bounding_rect()?;
        Some(Self { min: rect.min(), max: rect.max() })
    }

    /// Of all shapes of a layer.
    pub fn of_all(shapes: &Shapes) -> Option<Self> {
        let join = |a: Self, b: Self| Self {
            min: Coord { x: a.min.x.min(b.min.x), y: a.min.y.min(b.min.y) },
            max: Coord { x: a.max.x.max(b.max.x), y: a.max.y.max(b.max.y) },
        };
        match shapes {
            Shapes::None => None,
            Shapes::Points(points) => {
                points.iter().filter(|p| !p.x.is_nan()).map(|&p| Self { min: p, max: p }).reduce(join)
            }
            Shapes::Any(any) => any.iter().flatten().filter_map(Self::of).reduce(join),
        }
    }
}

/// A box with what it stands for: a row's key, or a node's number.
#[derive(Debug, Clone, Copy)]
struct Cell {
    id: i64,
    /// x min, x max, y min, y max, rounded outward.
    sides: [f32; 4],
}

impl Cell {
    fn new(id: i64, b: Bounds) -> Self {
        Self { id, sides: [below(b.min.x), above(b.max.x), below(b.min.y), above(b.max.y)] }
    }

    /// The box around boxes.
    fn around(id: i64, cells: &[Self]) -> Self {
        let mut sides = [f32::INFINITY, f32::NEG_INFINITY, f32::INFINITY, f32::NEG_INFINITY];
        for cell in cells {
            for (i, side) in sides.iter_mut().enumerate() {
                *side = if i % 2 == 0 { side.min(cell.sides[i]) } else { side.max(cell.sides[i]) };
            }
        }
        Self { id, sides }
    }

    /// Twice the middle along an axis (0 for x, 1 for y).
    fn middle(&self, axis: usize) -> f64 {
        f64::from(self.sides[2 * axis]) + f64::from(self.sides[2 * axis + 1])
    }
}

/// The greatest float that is not above `v`.
fn below(v: f64) -> f32 {
    let f = v as f32;
    if f64::from(f) > v { f.next_down() } else { f }
}

/// The least float that is not below `v`.
fn above(v: f64) -> f32 {
    let f = v as f32;
    if f64::from(f) < v { f.next_up() } else { f }
}

/// One node and where it hangs.
pub(super) struct Node {
    pub number: i64,
    /// Nothing for the root.
    pub parent: Option<i64>,
    pub data: Vec<u8>,
}

/// A whole index.
pub(super) struct Packed {
    /// Nodes in the order of their numbers, the root (number 1) first.
    pub nodes: Vec<Node>,
    /// For each row that has a shape, its key and its leaf, in the order of keys.
    pub leaves: Vec<(i64, i64)>,
}

const HEADER: usize = 4;
const CELL: usize = 24;

/// Packs the shapes of a layer, the first row having the key 1, into nodes of `node_size` bytes.
pub(super) fn pack(shapes: &Shapes, node_size: usize) -> Packed {
    let capacity = (node_size.saturating_sub(HEADER) / CELL).max(2);
    let mut cells = cells(shapes);

    // Bottom up: each level's groups of cells become nodes, their boxes the cells of the level above.
    let mut levels: Vec<Vec<Vec<Cell>>> = Vec::new();
    while cells.len() > capacity {
        let groups = tiles(cells, capacity);
        cells = groups.iter().enumerate().map(|(i, group)| Cell::around(i as i64, group)).collect();
        levels.push(groups);
    }
    levels.push(vec![cells]);

    // Numbers run from the root down; so far a cell above the leaves holds its node's place within its level.
    let depth = levels.len() - 1;
    let (mut nodes, mut leaves) = (Vec::new(), Vec::new());
    let mut first = 1_i64;
    let mut parents: Vec<Option<i64>> = vec![None];
    for (level, groups) in levels.iter().enumerate().rev() {
        let below_first = first + groups.len() as i64;
        let mut below_parents = vec![None; if level == 0 { 0 } else { levels[level - 1].len() }];
        for (i, group) in groups.iter().enumerate() {
            let number = first + i as i64;
            let mut data = Vec::with_capacity(node_size);
            data.extend_from_slice(&(if number == 1 { depth as u16 } else { 0 }).to_be_bytes());
            data.extend_from_slice(&(group.len() as u16).to_be_bytes());
            for cell in group {
                let id = if level == 0 {
                    leaves.push((cell.id, number));
                    cell.id
                } else {
                    below_parents[cell.id as usize] = Some(number);
                    below_first + cell.id
                };
                data.extend_from_slice(&id.to_be_bytes());
                cell.sides.iter().for_each(|side| data.extend_from_slice(&side.to_be_bytes()));
            }
            data.resize(node_size, 0);
            nodes.push(Node { number, parent: parents[i], data });
        }
        parents = below_parents;
        first = below_first;
    }
    leaves.par_sort_unstable();
    Packed { nodes, leaves }
}

fn cells(shapes: &Shapes) -> Vec<Cell> {
    let key = |row: usize| row as i64 + 1;
    match shapes {
        Shapes::None => Vec::new(),
        Shapes::Points(points) => {
            let there = points.iter().enumerate().filter(|(_, p)| !p.x.is_nan());
            there.map(|(row, &p)| Cell::new(key(row), Bounds { min: p, max: p })).collect()
        }
        Shapes::Any(any) => {
            let bounds = any.iter().enumerate().filter_map(|(row, g)| Some((row, Bounds::of(g.as_ref()?)?)));
            bounds.map(|(row, b)| Cell::new(key(row), b)).collect()
        }
    }
}

/// Cuts cells into the least number of nodes, evenly filled: into vertical strips by x, each strip by y.
fn tiles(mut cells: Vec<Cell>, capacity: usize) -> Vec<Vec<Cell>> {
    let by = |axis: usize| {
        // The id settles ties, so that the order never depends on the sort.
        move |a: &Cell, b: &Cell| a.middle(axis).total_cmp(&b.middle(axis)).then(a.id.cmp(&b.id))
    };
    let node_count = cells.len().div_ceil(capacity);
    let strip_count = (node_count as f64).sqrt().ceil() as usize;
    cells.par_sort_unstable_by(by(0));
    let mut groups = Vec::with_capacity(node_count);
    let mut rest: &mut [Cell] = &mut cells;
    for strip in 0..strip_count {
        // Whole nodes to a strip, so that their number stays least.
        let nodes_left = node_count - groups.len();
        let nodes = nodes_left.div_ceil(strip_count - strip);
        let size = share(rest.len(), nodes, nodes_left);
        let (strip, after) = std::mem::take(&mut rest).split_at_mut(size);
        rest = after;
        strip.par_sort_unstable_by(by(1));
        let mut strip: &[Cell] = strip;
        for node in 0..nodes {
            let (group, after) = strip.split_at(share(strip.len(), 1, nodes - node));
            groups.push(group.to_vec());
            strip = after;
        }
    }
    groups
}

/// `part` of `whole` equal shares of `count`, rounded up.
fn share(count: usize, part: usize, whole: usize) -> usize {
    if whole == 0 { 0 } else { (count * part).div_ceil(whole) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn floats_are_rounded_outward() {
        for v in [0.1, -0.1, 430_000.123, 5_210_000.7, 0.0, 16_777_217.0] {
            assert!(f64::from(below(v)) <= v && v <= f64::from(above(v)), "{v}");
            assert!(above(v) <= below(v).next_up(), "{v}");
        }
    }

    #[test]
    fn every_cell_lands_in_one_node_and_no_node_is_overfull_or_half_empty() {
        for count in [52, 100, 103, 1000, 2603, 9999] {
            let cells: Vec<Cell> = (0..count)
                .map(|i| {
                    let (x, y) = (f64::from(i * 7919 % count), f64::from(i * 104_729 % 311));
                    Cell::new(i64::from(i), Bounds { min: Coord { x, y }, max: Coord { x, y } })
                })
                .collect();
            let groups = tiles(cells, 51);
            assert_eq!(groups.len(), (count as usize).div_ceil(51));
            assert!(groups.iter().all(|g| (25..=51).contains(&g.len())), "{count}");
            let mut ids: Vec<i64> = groups.iter().flatten().map(|c| c.id).collect();
            ids.sort_unstable();
            assert!(ids.into_iter().eq(0..i64::from(count)));
        }
    }
}
