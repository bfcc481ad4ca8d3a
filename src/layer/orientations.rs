//! Layer `orientations`: one accepted reading.

use super::{Results, carried};
use crate::orientation::{Attitude, Polarity, Rotation};
use crate::symbol;
use crate::table::{Column, IntegerColumn, Shapes, Table, TextColumn, WordColumn};

pub(super) fn table(results: &Results) -> Table {
    let readings = results.readings;
    let n = readings.len();
    let structure = |i: usize| &readings.structures[readings.structure[i] as usize];
    let real = |get: &dyn Fn(usize) -> Option<f64>| (0..n).map(get).collect::<Column>();
    let words = |get: &dyn Fn(usize) -> Option<&'static str>| (0..n).map(get).collect::<Column>();
    let plane = |i: usize| if let Attitude::Plane(p) = readings.attitude[i] { Some(p) } else { None };
    let line = |i: usize| if let Attitude::Line(l) = readings.attitude[i] { Some(l) } else { None };
    let rotation = |i: usize| readings.grid_azimuth[i].map(Rotation::along);
    let domain = |i: usize| results.domains.of[i].map(|id| &results.domains.list[id.index()]);

    let mut station_id = TextColumn::default();
    let mut source_row = IntegerColumn::default();
    let (mut source, mut structures, mut domain_name) =
        (WordColumn::default(), WordColumn::default(), WordColumn::default());
    let (mut symbols, mut labels) = (WordColumn::default(), WordColumn::default());
    let mut domain_id = IntegerColumn::default();
    for i in 0..n {
        station_id.push(readings.station_id.get(i));
        source.push(Some(&readings.sources[readings.source[i] as usize]));
        source_row.push(i64::try_from(readings.source_row[i]).ok());
        structures.push(Some(&structure(i).name));
        let inclination = readings.attitude[i].inclination().degrees();
        symbols
            .push(Some(symbol::choose(&structure(i).name, structure(i).kind, inclination, readings.polarity[i]).code));
        labels.push(symbol::label(structure(i).kind, inclination).as_deref());
        domain_id.push(domain(i).map(|d| i64::from(d.id.number())));
        domain_name.push(domain(i).map(|d| d.name.as_str()));
    }
    let deviation = deviations(results);

    let mut table = Table::new("orientations")
        .with("station_id", "Station", "Id of the station, where the source has one", Column::Text(station_id))
        .with("source", "Source", "The file or layer, as the area file names it", Column::Word(source))
        .with("source_row", "Source row", "Line number in a text source (the header is line 1), feature id elsewhere", Column::Integer(source_row))
        .with("structure", "Structure", "What was measured: bedding, joint, lineation …", Column::Word(structures))
        .with("kind", "Kind", "planar (strike and dip) or linear (trend and plunge)", words(&|i| Some(structure(i).kind.word())))
        .with("polarity", "Polarity", "upright, overturned or unknown; null for lines", words(&|i| plane(i).map(|_| readings.polarity[i].word())))
        .with(
            "sense",
            "Sense",
            "down or up: which way a directed line points; azimuth, trend and plunge are those of its lower end; null for planes and lines without sense",
            words(&|i| line(i).and_then(|_| sense(readings.polarity[i]))),
        )
        .with("azimuth", "Azimuth", "Strike (right-hand rule) or trend; degrees clockwise from true north, [0, 360); null for a horizontal plane given without one", real(&|i| readings.attitude[i].azimuth().map(|a| a.degrees())))
        .with("inclination", "Inclination", "Dip or plunge; degrees down from horizontal, [0, 90]", real(&|i| Some(readings.attitude[i].inclination().degrees())))
        .with("strike", "Strike", "Right-hand strike of a plane (it dips to the right); degrees clockwise from true north, [0, 360)", real(&|i| plane(i)?.strike.map(|s| s.degrees())))
        .with("dip", "Dip", "Dip of a plane; degrees down from horizontal, [0, 90]", real(&|i| plane(i).map(|p| p.dip.degrees())))
        .with("dip_direction", "Dip direction", "Azimuth of steepest descent, strike + 90; degrees clockwise from true north, [0, 360)", real(&|i| plane(i)?.dip_direction().map(|d| d.degrees())))
        .with("trend", "Trend", "Trend of a line; degrees clockwise from true north, [0, 360)", real(&|i| line(i).map(|l| l.trend.degrees())))
        .with("plunge", "Plunge", "Plunge of a line; degrees down from horizontal, [0, 90]", real(&|i| line(i).map(|l| l.plunge.degrees())))
        .with("declination", "Declination", "Magnetic declination added to the azimuth as read; degrees, east positive; null where it was not read against magnetic north", real(&|i| Some(readings.declination[i])))
        .with("convergence", "Convergence", "Meridian convergence of this layer's CRS at the station; degrees, positive where grid north lies east of true north", real(&|i| Some(readings.convergence[i])))
        .with("rotation_true", "Rotation, true north", "Clockwise turn of a north-up symbol on a map whose top is true north; degrees, [0, 360)", real(&|i| Some(readings.attitude[i].azimuth().map_or(0.0, |a| a.degrees()))))
        .with("rotation_grid", "Rotation, grid north", "Clockwise turn of a north-up symbol on a map drawn in this layer's CRS; degrees, [0, 360). It does not hold in another CRS", real(&|i| Some(rotation(i).map_or(0.0, Rotation::clockwise))))
        .with("rotation_ccw", "Rotation, counter-clockwise", "The same turn counted counter-clockwise, (360 - rotation_grid) mod 360, for renderers that turn that way", real(&|i| Some(rotation(i).map_or(0.0, Rotation::counter_clockwise))))
        .with("symbol", "Symbol", "Code of the map symbol; a number is that of FGDC-STD-013-2006", Column::Word(symbols))
        .with("label", "Label", "Dip or plunge to print beside the symbol; null for horizontal and vertical", Column::Word(labels))
        .with("plot_at_scale", "Plot at scale", "Scale denominator: draw at this scale or larger; null where symbols were not thinned", real(&|_| None))
        .with("domain_id", "Domain number", "Number of the structural domain; null outside all", Column::Integer(domain_id))
        .with("domain", "Domain", "Name of the structural domain; null outside all", Column::Word(domain_name))
        .with("deviation", "Deviation", "Acute angle to the mean axis of the same structure in the same domain; degrees, [0, 90]; null where there is no mean", deviation)
        .with("outlier", "Outlier", "True where the reading belongs to its domain's fabric less than to none; null where not judged", Column::Boolean((0..n).fold(IntegerColumn::default(), |mut c, _| { c.push(None); c })))
        .with("set_id", "Set", "Number of the orientation set within the domain; null where no sets were sought", results.set_of.iter().map(|s| s.map(i64::from)).collect());
    let carried = carried::fields(results, &table);
    table.fields.extend(carried);
    table.shapes = Shapes::Points(readings.position.clone());
    table.crs = Some(results.crs.to_owned());
    table
}

/// Lines that carry a sense keep it in the polarity: turned over where they point up.
fn sense(polarity: Polarity) -> Option<&'static str> {
    match polarity {
        Polarity::Upright => Some("down"),
        Polarity::Overturned => Some("up"),
        Polarity::Unknown => None,
    }
}

fn deviations(results: &Results) -> Column {
    let readings = results.readings;
    let structures = readings.structures.len();
    let mut means = vec![None; results.domains.list.len() * structures];
    for placed in results.fabrics {
        if let Some(s) = readings.structures.iter().position(|s| *s == placed.structure) {
            means[placed.domain * structures + s] = placed.fabric.mean;
        }
    }
    (0..readings.len())
        .map(|i| {
            let domain = results.domains.of[i]?;
            let mean = means[domain.index() * structures + readings.structure[i] as usize]?;
            Some(readings.attitude[i].axis().angle_to(mean))
        })
        .collect()
}
