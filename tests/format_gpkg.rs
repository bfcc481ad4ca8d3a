//! The GeoPackage writer, held against OGC 12-128r17 (GeoPackage 1.3), GDAL's conformance checker and SQLite's own
//! check of its R-trees.

use geo_types::{Coord, Geometry, LineString, MultiLineString, MultiPolygon, Polygon, line_string, polygon};
use homocline::format::gpkg::{GeometryKind, LayerToWrite, Metadata, Package, Style, WriteError, write};
use homocline::format::{ReadTable, Source, read};
use homocline::notice::Silent;
use homocline::table::{Cell, Column, IntegerColumn, RealColumn, Shapes, Table, TextColumn, WordColumn};
use rand::{RngExt, SeedableRng};
use rand_chacha::ChaCha8Rng;
use rusqlite::Connection;
use std::path::Path;
use std::process::Command;

const STAMP: &str = "2024-06-01T12:00:00.000Z";
const EAST: f64 = 430_000.0;
const NORTH: f64 = 5_210_000.0;

fn points(count: usize, seed: u64) -> Vec<Coord<f64>> {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    let mut draw = |from: f64| from + random.random::<f64>() * 12_000.0;
    (0..count)
        // Every tenth row without a shape; some points many times over.
        .map(|i| match i % 10 {
            9 => Coord { x: f64::NAN, y: f64::NAN },
            5 => Coord { x: EAST, y: NORTH },
            _ => Coord { x: draw(EAST), y: draw(NORTH) },
        })
        .collect()
}

/// A layer of points with a column of every type, nulls among them.
fn stations(count: usize) -> Table {
    let mut table = Table::new("orientations");
    let (mut id, mut word) = (TextColumn::default(), WordColumn::default());
    let (mut real, mut whole) = (RealColumn::default(), IntegerColumn::default());
    let (mut yes, mut date) = (IntegerColumn::default(), TextColumn::default());
    for i in 0..count {
        let there = i % 7 != 3;
        id.push(there.then(|| format!("Größe \"{i}\"")).as_deref());
        word.push(there.then_some(["bedding", "joint", ""][i % 3]));
        real.push(there.then_some(i as f64 / 3.0));
        whole.push(there.then_some(i as i64 * 1_000_000_007));
        yes.push(there.then_some((i % 2) as i64));
        date.push(there.then_some("2024-02-29"));
    }
    table.shapes = Shapes::Points(points(count, 1));
    table
        .with("station_id", "Station", "As in the source", Column::Text(id))
        .with("structure", "Structure", "", Column::Word(word))
        .with("Strike °", "", "degrees, right-hand rule", Column::Real(real))
        .with("select", "", "", Column::Integer(whole))
        .with("outlier", "Outlier", "far from the mean", Column::Boolean(yes))
        .with("a \"quoted\" name", "", "", Column::Date(date))
}

fn squares() -> Table {
    let mut table = Table::new("domains");
    let square = |x: f64| polygon![(x: x, y: 0.0), (x: x + 9.0, y: 0.0), (x: x + 9.0, y: 9.0), (x: x, y: 9.0)];
    let shapes: Vec<Option<Geometry<f64>>> = vec![
        Some(square(EAST).into()),
        Some(MultiPolygon(vec![square(EAST + 20.0), square(EAST + 40.0)]).into()),
        None,
        Some(MultiPolygon::<f64>(vec![]).into()),
    ];
    table.shapes = Shapes::Any(shapes);
    table.with("domain", "Domain", "Name", [Some("A"), Some("B"), Some("C"), None].into_iter().collect())
}

fn lines() -> Table {
    let mut table = Table::new("boundaries");
    let line: LineString<f64> = line_string![(x: EAST, y: 0.0), (x: EAST + 5.0, y: 7.0)];
    table.shapes = Shapes::Any(vec![Some(line.clone().into()), Some(MultiLineString(vec![line.clone(), line]).into())]);
    table.with("length_m", "Length", "metres", [Some(1.5), None].into_iter().collect())
}

fn refusals() -> Table {
    Table::new("refusals").with("row", "Row", "Line in the source", [Some(2_i64), None].into_iter().collect())
}

fn layer(table: &Table, geometry: GeometryKind) -> LayerToWrite<'_> {
    LayerToWrite { table, geometry, title: format!("{} of the area", table.name), description: "rows".into() }
}

fn package(tables: &[Table; 5]) -> Package<'_> {
    use GeometryKind::{MultiLineString, MultiPolygon, None, Point};
    let kinds = [Point, MultiPolygon, MultiLineString, None, Point];
    Package {
        crs: "EPSG:32633".into(),
        layers: tables.iter().zip(kinds).map(|(t, k)| layer(t, k)).collect(),
        metadata: vec![Metadata {
            standard_uri: "https://www.w3.org/TR/prov-o/".into(),
            mime_type: "application/json".into(),
            text: "{\"seed\": 1}".into(),
        }],
        styles: vec![Style {
            layer: "orientations".into(),
            name: "Dip symbols".into(),
            qml: "<qgis/>".into(),
            sld: "<StyledLayerDescriptor/>".into(),
            description: "at 1:25 000".into(),
            default: true,
        }],
        last_change: STAMP.into(),
    }
}

fn tables(count: usize) -> [Table; 5] {
    let mut empty = stations(0);
    empty.name = "fold_axes".into();
    [stations(count), squares(), lines(), refusals(), empty]
}

fn written(folder: &Path, count: usize) -> std::path::PathBuf {
    let path = folder.join("area.gpkg");
    write(&path, &package(&tables(count)), &Silent).unwrap();
    path
}

fn layer_back(path: &Path, layer: &str) -> ReadTable {
    let location = path.to_string_lossy().into_owned();
    read(&Source { path: "area.gpkg".into(), location, layer: Some(layer.into()) }, &Silent).unwrap()
}

fn one<T: rusqlite::types::FromSql>(db: &Connection, sql: &str) -> T {
    db.query_row(sql, [], |row| row.get(0)).unwrap_or_else(|error| panic!("{sql}: {error}"))
}

#[test]
fn gdals_conformance_checker_finds_nothing() {
    let folder = tempfile::tempdir().unwrap();
    let path = written(folder.path(), 1000);
    let script = "/usr/lib/python3/dist-packages/osgeo_utils/samples/validate_gpkg.py";
    assert!(
        Path::new(script).is_file(),
        "GDAL's GeoPackage checker is missing: install it with `apt-get install python3-gdal`"
    );
    let check = || {
        let run = Command::new("/usr/bin/python3").args([script, "-k", "--warning-as-error"]).arg(&path).output();
        let run = run.expect("/usr/bin/python3 is needed: `apt-get install python3-gdal`");
        (
            run.status.success(),
            format!("{}{}", String::from_utf8_lossy(&run.stdout), String::from_utf8_lossy(&run.stderr)),
        )
    };
    let (passed, said) = check();
    assert!(passed && !said.to_lowercase().contains("error") && !said.contains("Req"), "{said}");
    // A checker that passes everything would prove nothing.
    Connection::open(&path).unwrap().execute_batch("PRAGMA application_id = 0").unwrap();
    assert!(!check().0, "the checker passed a file without application id");
}

#[test]
fn every_layer_comes_back_through_gdal() {
    let folder = tempfile::tempdir().unwrap();
    let path = written(folder.path(), 100);
    let original = tables(100);
    let back = layer_back(&path, "orientations");
    assert_eq!((back.read, back.refused.len(), back.notices.len()), (100, 0, 0));
    assert_eq!(back.table.crs.as_deref(), Some("EPSG:32633"));
    assert_eq!(back.table.rows, (1..=100).collect::<Vec<u64>>());
    for (field, was) in back.table.fields.iter().zip(&original[0].fields) {
        assert_eq!(field.name, was.name);
        for row in 0..100 {
            let expected = match was.column.cell(row) {
                // GDAL's binding does not tell yes-or-no from whole numbers.
                Cell::Boolean(v) => Cell::Integer(i64::from(v)),
                cell => cell,
            };
            assert_eq!(field.column.cell(row), expected, "{} {row}", field.name);
        }
    }
    let (Shapes::Points(back), Shapes::Points(was)) = (&back.table.shapes, &original[0].shapes) else {
        panic!("no points")
    };
    assert!(back.iter().zip(was).all(|(b, w)| b == w || (b.x.is_nan() && w.x.is_nan())));

    let Shapes::Any(polygons) = layer_back(&path, "domains").table.shapes else { panic!("no polygons") };
    let Shapes::Any(was) = &original[1].shapes else { panic!("no polygons") };
    let Some(Geometry::Polygon(first)) = &was[0] else { panic!("no polygon") };
    assert_eq!(polygons[0], Some(MultiPolygon(vec![first.clone()]).into()));
    assert_eq!((&polygons[1], &polygons[2], &polygons[3]), (&was[1], &None, &None));

    let Shapes::Any(lines) = layer_back(&path, "boundaries").table.shapes else { panic!("no lines") };
    assert!(matches!(&lines[0], Some(Geometry::MultiLineString(l)) if l.0.len() == 1));
    let attributes = layer_back(&path, "refusals").table;
    assert_eq!((&attributes.shapes, attributes.fields[0].column.cell(0)), (&Shapes::None, Cell::Integer(2)));
}

#[test]
fn the_spatial_index_holds_every_shape_and_finds_what_a_full_scan_finds() {
    let folder = tempfile::tempdir().unwrap();
    // One leaf; a root over leaves (51 cells to a node); three levels.
    for count in [40, 300, 20_000] {
        let path = written(folder.path(), count);
        let db = Connection::open(&path).unwrap();
        let coordinates = points(count, 1);
        let there: Vec<(usize, Coord<f64>)> =
            coordinates.iter().copied().enumerate().filter(|(_, c)| !c.x.is_nan()).collect();
        for name in ["orientations", "domains", "boundaries", "fold_axes"] {
            assert_eq!(one::<String>(&db, &format!("SELECT rtreecheck('rtree_{name}_geom')")), "ok", "{name} {count}");
        }
        let indexed: i64 = one(&db, "SELECT count(*) FROM rtree_orientations_geom");
        assert_eq!(indexed as usize, there.len());
        // Two of the four domains have a shape that is neither missing nor empty.
        assert_eq!(one::<i64>(&db, "SELECT count(*) FROM rtree_domains_geom"), 2);
        let mut find = db
            .prepare("SELECT id FROM rtree_orientations_geom WHERE maxx>=?1 AND minx<=?2 AND maxy>=?3 AND miny<=?4")
            .unwrap();
        let mut random = ChaCha8Rng::seed_from_u64(2);
        for _ in 0..50 {
            let x = EAST + random.random::<f64>() * 12_000.0;
            let y = NORTH + random.random::<f64>() * 12_000.0;
            let size = random.random::<f64>() * 3_000.0;
            let inside = |c: Coord<f64>| (x..=x + size).contains(&c.x) && (y..=y + size).contains(&c.y);
            let ids = find.query_map([x, x + size, y, y + size], |r| r.get::<_, i64>(0)).unwrap();
            // The index is of 4-byte floats rounded outward: a reader looks at the shape itself last.
            let mut found: Vec<usize> =
                ids.map(|id| id.unwrap() as usize - 1).filter(|&row| inside(coordinates[row])).collect();
            found.sort_unstable();
            let scanned: Vec<usize> = there.iter().filter(|(_, c)| inside(*c)).map(|&(row, _)| row).collect();
            assert_eq!(found, scanned);
        }
    }
}

#[test]
fn the_file_is_a_geopackage_as_the_standard_asks() {
    let folder = tempfile::tempdir().unwrap();
    let path = written(folder.path(), 1000);
    let db = Connection::open(&path).unwrap();
    assert_eq!(one::<String>(&db, "PRAGMA integrity_check"), "ok");
    // Requirement 2: "GPKG" in ASCII, and 1.3.0.
    assert_eq!(one::<i64>(&db, "PRAGMA application_id"), 0x4750_4B47);
    assert_eq!(one::<i64>(&db, "PRAGMA user_version"), 10300);
    // Requirement 11: three CRS in every file, and the layers'.
    assert_eq!(one::<i64>(&db, "SELECT count(*) FROM gpkg_spatial_ref_sys WHERE srs_id IN (-1, 0, 4326, 32633)"), 4);
    let stamps = "SELECT count(DISTINCT last_change) || min(last_change) FROM gpkg_contents";
    assert_eq!(one::<String>(&db, stamps), format!("1{STAMP}"));
    assert_eq!(one::<i64>(&db, "SELECT feature_count FROM gpkg_ogr_contents WHERE table_name='orientations'"), 1000);
    let extent = "SELECT min_x || ' ' || max_y FROM gpkg_contents WHERE table_name='domains'";
    assert_eq!(one::<String>(&db, extent), "430000.0 9.0");
    let meaning = "SELECT title || '|' || description FROM gpkg_data_columns WHERE column_name='outlier' \
                   AND table_name='orientations'";
    assert_eq!(one::<String>(&db, meaning), "Outlier|far from the mean");
    assert_eq!(one::<String>(&db, "SELECT metadata FROM gpkg_metadata"), "{\"seed\": 1}");
    let style =
        "SELECT f_table_catalog || f_table_schema || f_geometry_column || styleName || useAsDefault FROM layer_styles";
    assert_eq!(one::<String>(&db, style), "geomDip symbols1");
    // The triggers of the index (requirement 75) are back: six, and GDAL's two that count features.
    let triggers = "SELECT count(*) FROM sqlite_master WHERE type='trigger' AND tbl_name='orientations'";
    assert_eq!(one::<i64>(&db, triggers), 8);
    assert_eq!(one::<i64>(&db, "SELECT seq FROM sqlite_sequence WHERE name='orientations'"), 1000);
}

#[test]
fn the_same_tables_give_the_same_bytes_and_replace_what_was_there() {
    let (a, b) = (tempfile::tempdir().unwrap(), tempfile::tempdir().unwrap());
    let first = std::fs::read(written(a.path(), 2000)).unwrap();
    std::fs::write(b.path().join("area.gpkg"), "an older file").unwrap();
    std::fs::write(b.path().join("area.gpkg-wal"), "another program's journal").unwrap();
    let second = std::fs::read(written(b.path(), 2000)).unwrap();
    assert!(first == second, "the bytes differ");
    let left: Vec<_> = std::fs::read_dir(b.path()).unwrap().map(|e| e.unwrap().file_name()).collect();
    assert_eq!(left, ["area.gpkg"]);
}

#[test]
fn a_target_that_cannot_be_written_is_an_error_and_leaves_nothing() {
    let folder = tempfile::tempdir().unwrap();
    let tables = tables(10);
    let good = package(&tables);
    let nowhere = folder.path().join("nowhere").join("area.gpkg");
    let error = write(&nowhere, &good, &Silent).unwrap_err();
    assert!(matches!(error, WriteError::Folder { .. }) && error.to_string().contains("nowhere"), "{error}");
    let error = write(folder.path(), &good, &Silent).unwrap_err();
    assert!(matches!(error, WriteError::Place { .. }), "{error}");

    let target = folder.path().join("area.gpkg");
    std::fs::write(&target, "as it was").unwrap();
    let error = write(&target, &Package { crs: "EPSG:1".into(), ..good.clone() }, &Silent).unwrap_err();
    assert!(matches!(error, WriteError::Crs { .. }) && error.to_string().contains("EPSG:1"), "{error}");
    let error = write(&target, &Package { last_change: "today".into(), ..good.clone() }, &Silent).unwrap_err();
    assert!(error.to_string().contains("today"), "{error}");
    let mut wrong = good.clone();
    wrong.layers[1].geometry = GeometryKind::Point;
    let error = write(&target, &wrong, &Silent).unwrap_err();
    assert!(matches!(error, WriteError::Content { .. }) && error.to_string().contains("\"domains\""), "{error}");
    let twice = tables[3].clone().with("ROW", "", "", [None::<i64>, None].into_iter().collect());
    let clash = Package { layers: vec![layer(&twice, GeometryKind::None)], styles: vec![], ..good.clone() };
    let error = write(&target, &clash, &Silent).unwrap_err();
    assert!(error.to_string().contains("\"ROW\""), "{error}");

    assert_eq!(std::fs::read_to_string(&target).unwrap(), "as it was");
    assert_eq!(std::fs::read_dir(folder.path()).unwrap().count(), 1);
}

#[test]
fn a_crs_of_the_users_own_is_kept_as_wkt() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("own.gpkg");
    let mut table = Table::new("points");
    table.shapes = Shapes::Points(vec![Coord { x: 1.0, y: 2.0 }]);
    let crs = "+proj=tmerc +lat_0=0 +lon_0=13.3 +k=1 +x_0=0 +y_0=-5000000 +ellps=bessel +units=m".to_owned();
    let layers = vec![layer(&table, GeometryKind::Point)];
    let package = Package { crs, layers, metadata: vec![], styles: vec![], last_change: STAMP.into() };
    write(&path, &package, &Silent).unwrap();
    let back = layer_back(&path, "points").table;
    assert!(back.crs.is_some_and(|wkt| wkt.contains("Bessel") && wkt.contains("13.3")));
    assert_eq!(back.shapes, table.shapes);
}

#[test]
fn a_polygon_with_a_hole_keeps_it() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("hole.gpkg");
    let ring = |a: f64, b: f64| LineString::from(vec![(a, a), (b, a), (b, b), (a, b), (a, a)]);
    let shape = Polygon::new(ring(0.0, 9.0), vec![ring(3.0, 6.0)]);
    let mut table = Table::new("domains");
    table.shapes = Shapes::Any(vec![Some(shape.clone().into())]);
    let layers = vec![layer(&table, GeometryKind::MultiPolygon)];
    let package =
        Package { crs: "EPSG:4326".into(), layers, metadata: vec![], styles: vec![], last_change: STAMP.into() };
    write(&path, &package, &Silent).unwrap();
    let back = layer_back(&path, "domains").table;
    assert_eq!(back.shapes, Shapes::Any(vec![Some(MultiPolygon(vec![shape]).into())]));
    assert_eq!(back.crs.as_deref(), Some("EPSG:4326"));
}
