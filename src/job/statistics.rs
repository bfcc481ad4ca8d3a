//! Every statistic of every (domain, structure): fabric, fold axis, sets.

use super::exposure::ExposurePlan;
use super::fabric_plan::Uncertainty;
use super::grouping::{Group, groups, stations};
use super::plan::Plan;
use super::seeds::seed;
use crate::crs::MapCrs;
use crate::domain::Domains;
use crate::fabric::fold::{self, FoldAxis};
use crate::fabric::sets::{self, SetCount, Sets};
use crate::fabric::{
    self, Cone, Directed, DirectedFabric, Direction, Fabric, FabricOptions, Sample, Shape, bootstrap, terzaghi,
};
use crate::layer::{self, PlacedFabric, PlacedFold, PlacedSet};
use crate::notice::{Notice, Place, Progress};
use crate::orientation::{Attitude, GridAzimuth, Polarity, TrueAzimuth};
use crate::station::{Kind, Readings};
use crate::table::Table;
use geo::{Coord, InteriorPoint};
use rayon::prelude::*;

/// What the readings of all domains say.
pub(super) struct Statistics {
    pub fabrics: Vec<PlacedFabric>,
    pub folds: Vec<PlacedFold>,
    pub sets: Vec<PlacedSet>,
    /// For each reading the number of its set, from 1.
    pub set_of: Vec<Option<u32>>,
    pub notices: Vec<Notice>,
}

/// One (domain, structure) on its way.
struct Described {
    placed: PlacedFabric,
    fold: Option<PlacedFold>,
    sets: Vec<PlacedSet>,
    member: Vec<(u32, u32)>,
    notice: Option<Notice>,
}

/// Everything that the description of a group needs.
struct Context<'a> {
    plan: &'a Plan,
    readings: &'a Readings,
    tables: &'a [Table],
    domains: &'a Domains,
    map: &'a MapCrs,
    /// A point inside each domain.
    inside: Vec<Option<Coord<f64>>>,
}

/// Describes every (domain, structure) that holds a reading.
pub(super) fn describe(
    plan: &Plan,
    readings: &Readings,
    tables: &[Table],
    domains: &Domains,
    map: &MapCrs,
    metres: f64,
    progress: &dyn Progress,
) -> Statistics {
    let (stations, notices) = stations(readings, metres);
    let groups = groups(readings, domains, &stations);
    progress.begin("summarising fabrics", Some(groups.len() as u64));
    let mut inside: Vec<Option<Coord<f64>>> =
        domains.list.iter().map(|d| d.shape.interior_point().map(Coord::from)).collect();
    if inside.len() == 1 && inside[0].is_none() {
        // Stations on a line or at a point span no area; the fabric then stands at the first of them.
        inside[0] = readings.position.iter().copied().min_by(|a, b| a.x.total_cmp(&b.x).then(a.y.total_cmp(&b.y)));
    }
    let context = Context { plan, readings, tables, domains, map, inside };
    let described: Vec<Described> = groups
        .into_par_iter()
        .map(|group| {
            let described = context.describe(group);
            progress.advance(1);
            described
        })
        .collect();
    progress.end();
    let mut all = Statistics {
        fabrics: Vec::with_capacity(described.len()),
        folds: Vec::new(),
        sets: Vec::new(),
        set_of: vec![None; readings.len()],
        notices,
    };
    for d in described {
        all.fabrics.push(d.placed);
        all.folds.extend(d.fold);
        all.sets.extend(d.sets);
        all.notices.extend(d.notice);
        for (reading, set) in d.member {
            all.set_of[reading as usize] = Some(set);
        }
    }
    all
}

impl Context<'_> {
    fn describe(&self, mut group: Group) -> Described {
        let structure = self.readings.structures[group.structure].clone();
        let domain = &self.domains.list[group.domain].name;
        let at = self.inside[group.domain].unwrap_or(Coord { x: f64::NAN, y: f64::NAN });
        let options = FabricOptions { confidence: self.plan.fabric.confidence, folded: is_folded(&structure.name) };
        let mut notes = Vec::new();
        let clipped = self.weigh(&mut group, structure.kind, &mut notes);
        let notice = notes.first().map(|note| {
            let message = format!("{} in {domain}: {note}", structure.name);
            Notice::warning("exposure-weights", Place::default(), message)
        });
        let sample = Sample::new(&group.axes, structure.kind)
            .weighted(&group.weights)
            .and_then(|s| s.at_stations(&group.stations))
            .expect("weights were checked when they were read, and the columns are of one length");
        let mut fabric = fabric::summarise(&sample, &options);
        let count = self.plan.fabric.sets;
        let found = sets::sets(&sample, count, seed(self.plan.seed, domain, &structure.name, "sets"));
        if count != SetCount::Given(0) {
            fabric = fabric::with_sets(fabric, &found, &options);
        }
        let directed = self.directed(&group, &structure.name, &options, &mut notes);
        if let Some(with_sense) = &directed {
            let axial = std::mem::replace(&mut fabric, with_sense.fabric.clone());
            fabric.shape = axial.shape;
            fabric.mean = axial.mean.filter(|_| with_sense.mean.is_some());
        }
        self.resample(&mut fabric, &sample, domain, &structure.name, &mut notes);
        if !notes.is_empty() {
            notes.extend(Some(std::mem::take(&mut fabric.note)).filter(|n| !n.is_empty()));
            fabric.note = notes.join("; ");
        }
        let is_girdle = fabric.shape == Shape::Girdle && structure.kind == Kind::Planar;
        let fold = is_girdle.then(|| fold::fold_axis(&sample, self.plan.fabric.confidence)).flatten();
        let fold = fold.map(|axis| self.place_fold(&group, &structure.name, at, axis, &fabric, &sample, &found));
        // One set beside a background is the cluster itself; its row would draw the mean twice.
        let several = found.sets.len() > 1 || matches!(count, SetCount::Given(k) if k > 0);
        let (mut placed_sets, mut member) = (Vec::new(), Vec::new());
        if several {
            for (i, set) in found.sets.iter().enumerate() {
                let grid_azimuth = self.grid_azimuth(at, layer::azimuth_of(set.eigen.axes[0], structure.kind));
                placed_sets.push(PlacedSet {
                    domain: group.domain,
                    structure: structure.clone(),
                    number: i as u32 + 1,
                    set: set.clone(),
                    at,
                    grid_azimuth,
                });
            }
            let numbered = found.member.iter().zip(&group.readings);
            member.extend(numbered.filter_map(|(set, &reading)| Some((reading, set.as_ref().map(|s| *s as u32 + 1)?))));
        }
        let mut placed =
            PlacedFabric { domain: group.domain, structure, fabric, clipped, directed, at, grid_azimuth: None };
        placed.grid_azimuth = layer::symbol_azimuth(&placed).and_then(|a| self.grid_azimuth(at, a));
        Described { placed, fold, sets: placed_sets, member, notice }
    }

    /// Multiplies exposure weights into the group's; returns how many were clipped.
    fn weigh(&self, group: &mut Group, kind: Kind, notes: &mut Vec<String>) -> usize {
        if self.plan.fabric.exposure == ExposurePlan::None || kind == Kind::Linear {
            return 0;
        }
        let exposures: Vec<_> = group
            .readings
            .iter()
            .map(|&i| {
                let source = self.readings.source[i as usize] as usize;
                self.plan.fabric.exposure.of(source, &self.tables[source], self.readings.table_row[i as usize] as usize)
            })
            .collect();
        match terzaghi::weights(&group.axes, terzaghi::Survey::Each(&exposures), self.plan.fabric.max_weight) {
            Ok(weights) => {
                for (own, more) in group.weights.iter_mut().zip(&weights.weights) {
                    *own = (*own * more).min(Sample::HEAVIEST);
                }
                weights.clipped
            }
            Err(_) => {
                let silent = exposures.iter().filter(|e| e.is_none()).count();
                notes.push(format!(
                    "no exposure weights: {silent} of {} readings do not say along what they were measured (map, line 110/00, face 200/60)",
                    exposures.len()
                ));
                0
            }
        }
    }

    /// The statistics with sense, where the structure is declared directed and every reading says its sense.
    fn directed(
        &self,
        group: &Group,
        structure: &str,
        options: &FabricOptions,
        notes: &mut Vec<String>,
    ) -> Option<DirectedFabric> {
        if !self.plan.fabric.directed.iter().any(|d| d == structure) {
            return None;
        }
        let sense = |&i: &u32| {
            let polarity = self.readings.polarity[i as usize];
            match self.readings.attitude[i as usize] {
                Attitude::Plane(plane) => Direction::facing(plane, polarity),
                // A line that points upward is kept as its lower end with this mark.
                Attitude::Line(line) if polarity == Polarity::Overturned => {
                    Some(Direction::from_trend_plunge(line.trend.degrees() + 180.0, -line.plunge.degrees()))
                }
                Attitude::Line(line) => Some(Direction::from_trend_plunge(line.trend.degrees(), line.plunge.degrees())),
            }
        };
        let directions: Vec<Option<Direction>> = group.readings.iter().map(sense).collect();
        let unknown = directions.iter().filter(|d| d.is_none()).count();
        if unknown > 0 {
            notes.push(format!(
                "no directed statistics: {unknown} of {} readings have no polarity; these are of axes without sense",
                directions.len()
            ));
            return None;
        }
        let directions: Vec<Direction> = directions.into_iter().flatten().collect();
        let kind = self.readings.structures[group.structure].kind;
        let columns =
            Directed { directions: &directions, weights: Some(&group.weights), stations: Some(&group.stations), kind };
        fabric::summarise_directed(&columns, options).ok()
    }

    /// Replaces the elliptical cones by bootstrapped ones where asked for.
    fn resample(&self, fabric: &mut Fabric, sample: &Sample, domain: &str, structure: &str, notes: &mut Vec<String>) {
        let (resamples, confidence) = (self.plan.fabric.resamples, self.plan.fabric.confidence);
        let mut replaced = false;
        for (which, cone) in [(0, &mut fabric.mean_cone), (2, &mut fabric.third_cone)] {
            if cone.is_none() {
                continue;
            }
            let seed = seed(self.plan.seed, domain, structure, if which == 0 { "cone of e1" } else { "cone of e3" });
            let toward = cone.map(|c| c.toward);
            let new = match self.plan.fabric.uncertainty {
                Uncertainty::Ellipse => return,
                Uncertainty::Pivotal => bootstrap::pivotal(sample, which, resamples, confidence, seed),
                Uncertainty::Percentile => bootstrap::percentile(sample, which, resamples, confidence, seed)
                    .map(|radius| Cone { major: radius, minor: radius, toward: toward.expect("there is a cone") }),
            };
            match new {
                Ok(new) => {
                    *cone = Some(new);
                    replaced = true;
                }
                Err(_) if fabric.units < bootstrap::LEAST => {
                    notes.push(format!(
                        "no bootstrap below {} stations: the cones are the elliptical ones",
                        bootstrap::LEAST
                    ));
                    return;
                }
                Err(_) => *cone = None,
            }
        }
        if replaced {
            notes.push(format!("cones by {} bootstrap, {resamples} resamples", self.plan.fabric.uncertainty.word()));
        }
    }

    #[allow(clippy::too_many_arguments)] // each is one fact of the girdle
    fn place_fold(
        &self,
        group: &Group,
        structure: &str,
        at: Coord<f64>,
        mut axis: FoldAxis,
        fabric: &Fabric,
        sample: &Sample,
        sets: &Sets,
    ) -> PlacedFold {
        axis.cone = fabric.third_cone.or(axis.cone);
        if !is_folded(structure) {
            let zone = "planes of this kind are seldom folded: read it as the axis of a zone of planes";
            axis.note = if axis.note.is_empty() { zone.into() } else { format!("{zone}; {}", axis.note) };
        }
        PlacedFold {
            domain: group.domain,
            structure: self.readings.structures[group.structure].clone(),
            n: fabric.n,
            limbs: fold::limbs_of_sets(sample, axis.axis, sets),
            grid_azimuth: self.grid_azimuth(at, axis.axis.trend()),
            fold: axis,
            at,
        }
    }

    fn grid_azimuth(&self, at: Coord<f64>, azimuth: f64) -> Option<GridAzimuth> {
        self.map.grid_azimuth(at, TrueAzimuth::new(azimuth).ok()?)
    }
}

/// Structures whose poles spread along a girdle by folding; two maxima of joints are two sets instead.
fn is_folded(structure: &str) -> bool {
    !matches!(structure, "joint" | "fault" | "vein" | "dike")
}
