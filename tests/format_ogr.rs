//! Sources that go through GDAL: shapefiles with their encodings and deleted records, zips, layers by name, KML.

use geo_types::{Coord, Geometry};
use homocline::format::gpkg::{GeometryKind, LayerToWrite, Package, write};
use homocline::format::{FormatError, ReadTable, Source, read};
use homocline::notice::Silent;
use homocline::table::{Cell, Column, Shapes, Table};
use std::fs;
use std::path::{Path, PathBuf};

fn data(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/data/format").join(name)
}

fn source(path: &Path, layer: Option<&str>) -> Source {
    let name = path.file_name().unwrap().to_string_lossy().into_owned();
    Source { path: name, location: path.to_string_lossy().into_owned(), layer: layer.map(str::to_owned) }
}

fn open(path: &Path) -> ReadTable {
    read(&source(path, None), &Silent).unwrap()
}

fn cell<'a>(table: &'a Table, name: &str, row: usize) -> Cell<'a> {
    table.column(name).unwrap().cell(row)
}

/// Copies the parts of a shapefile whose extension is listed.
fn copied(name: &str, parts: &[&str], folder: &Path) -> PathBuf {
    for part in parts {
        fs::copy(data(&format!("{name}.{part}")), folder.join(format!("{name}.{part}"))).unwrap();
    }
    folder.join(format!("{name}.shp"))
}

fn check_stations(read: &ReadTable) {
    let table = &read.table;
    assert_eq!((read.read, table.rows.clone(), table.crs.as_deref()), (3, vec![0, 1, 2], Some("EPSG:32633")));
    assert_eq!((cell(table, "id", 0), cell(table, "id", 1)), (Cell::Text("Größe"), Cell::Text("Ätna")));
    assert_eq!((cell(table, "strike", 0), cell(table, "strike", 1)), (Cell::Integer(45), Cell::Null));
    assert_eq!((cell(table, "dip", 0), cell(table, "dip", 2)), (Cell::Real(30.5), Cell::Real(20.0)));
    assert_eq!(cell(table, "date", 0), Cell::Text("2024-06-01"));
    assert!(matches!(table.column("date"), Some(Column::Date(_))));
    let Shapes::Points(points) = &table.shapes else { panic!("not points") };
    assert_eq!((points[0], points[2].x.is_nan()), (Coord { x: 430_000.5, y: 5_210_000.25 }, true));
}

#[test]
fn a_shapefile_is_read_in_the_encoding_that_its_cpg_names() {
    let read = open(&data("stations_utf8.shp"));
    check_stations(&read);
    assert!(read.notices.is_empty(), "{:?}", read.notices);
}

#[test]
fn a_shapefile_without_cpg_is_read_as_utf8_where_it_is_that_and_as_windows_1252_else() {
    let folder = tempfile::tempdir().unwrap();
    for (name, encoding) in [("stations_utf8", "UTF-8"), ("stations_1252", "Windows-1252")] {
        let read = open(&copied(name, &["shp", "shx", "dbf", "prj"], folder.path()));
        check_stations(&read);
        assert_eq!(read.notices[0].code, "encoding-guessed");
        assert!(read.notices[0].message.contains(encoding), "{}", read.notices[0].message);
    }
}

#[test]
fn a_deleted_record_is_no_row_and_the_others_keep_their_numbers() {
    let read = open(&data("blocks.shp"));
    assert_eq!((read.read, read.table.rows.clone()), (2, vec![0, 2]));
    assert_eq!((cell(&read.table, "name", 0), cell(&read.table, "name", 1)), (Cell::Text("A"), Cell::Text("C")));
    let Shapes::Any(shapes) = &read.table.shapes else { panic!("not polygons") };
    assert!(matches!(&shapes[0], Some(Geometry::Polygon(p)) if p.interiors().len() == 1));
    assert!(matches!(&shapes[1], Some(Geometry::MultiPolygon(p)) if p.0.len() == 2));
}

#[test]
fn a_shapefile_without_one_of_its_parts_names_it() {
    for (present, missing) in [(["shp", "shx"], "dbf"), (["shp", "dbf"], "shx")] {
        let folder = tempfile::tempdir().unwrap();
        let path = copied("blocks", &present, folder.path());
        let error = read(&source(&path, None), &Silent).unwrap_err();
        assert!(
            matches!(&error, FormatError::MissingPart { part, .. } if *part == format!("blocks.{missing}")),
            "{error}"
        );
    }
    let folder = tempfile::tempdir().unwrap();
    let path = copied("blocks", &["shp", "shx", "dbf"], folder.path());
    fs::write(&path, "not a shapefile at all").unwrap();
    let error = read(&source(&path, None), &Silent).unwrap_err();
    assert!(matches!(&error, FormatError::Corrupt { .. }), "{error}");
}

#[test]
fn a_zipped_shapefile_is_read_where_it_lies() {
    check_stations(&open(&data("stations.zip")));
}

#[test]
fn kml_is_read_in_longitude_and_latitude() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("places.kml");
    fs::write(
        &path,
        "<?xml version=\"1.0\"?><kml xmlns=\"http://www.opengis.net/kml/2.2\"><Document><name>d</name><Folder><name>stops</name>\
         <Placemark><name>S1</name><Point><coordinates>13.5,47.25,0</coordinates></Point></Placemark>\
         </Folder></Document></kml>",
    )
    .unwrap();
    let read = open(&path);
    assert_eq!(read.table.crs.as_deref(), Some("EPSG:4326"));
    assert_eq!(read.table.shapes, Shapes::Points(vec![Coord { x: 13.5, y: 47.25 }]));
    assert_eq!(cell(&read.table, "Name", 0), Cell::Text("S1"));
}

/// A GeoPackage of two point layers and a table.
fn two_layers(folder: &Path) -> PathBuf {
    let table = |name: &str| {
        let mut table = Table::new(name);
        table.shapes = Shapes::Points(vec![Coord { x: 1.0, y: 2.0 }]);
        table
    };
    let (a, b, c) =
        (table("north"), table("south"), Table::new("notes").with("t", "", "", [Some("x")].into_iter().collect()));
    let layer = |table, geometry| LayerToWrite { table, geometry, title: String::new(), description: String::new() };
    let path = folder.join("two.gpkg");
    let layers = vec![layer(&a, GeometryKind::Point), layer(&b, GeometryKind::Point), layer(&c, GeometryKind::None)];
    let last_change = "2024-06-01T12:00:00.000Z".to_owned();
    write(&path, &Package { crs: "EPSG:32633".into(), layers, metadata: vec![], styles: vec![], last_change }, &Silent)
        .unwrap();
    path
}

#[test]
fn of_several_layers_one_must_be_named() {
    let folder = tempfile::tempdir().unwrap();
    let path = two_layers(folder.path());
    let error = read(&source(&path, None), &Silent).unwrap_err().to_string();
    assert!(["two.gpkg", "\"north\"", "\"south\"", "\"notes\""].iter().all(|word| error.contains(word)), "{error}");
    let error = read(&source(&path, Some("east")), &Silent).unwrap_err().to_string();
    assert!(error.contains("\"east\"") && error.contains("\"north\""), "{error}");
    assert_eq!(read(&source(&path, Some("South")), &Silent).unwrap().read, 1);
    // Text and GeoJSON have one layer, named as the file.
    let csv = folder.path().join("stations.csv");
    fs::write(&csv, "id\na\n").unwrap();
    assert_eq!(read(&source(&csv, Some("stations")), &Silent).unwrap().read, 1);
    let error = read(&source(&csv, Some("east")), &Silent).unwrap_err();
    assert!(matches!(&error, FormatError::NoSuchLayer { layers, .. } if *layers == ["stations"]), "{error}");
}

#[test]
fn the_only_layer_with_geometry_needs_no_name() {
    let folder = tempfile::tempdir().unwrap();
    let path = two_layers(folder.path());
    let db = rusqlite::Connection::open(&path).unwrap();
    // Leaves "north" and the table "notes".
    db.execute_batch(
        "DELETE FROM gpkg_contents WHERE table_name='south'; DELETE FROM gpkg_geometry_columns WHERE table_name='south';
         DELETE FROM gpkg_ogr_contents WHERE table_name='south'; DELETE FROM gpkg_extensions WHERE table_name='south';
         DROP TABLE rtree_south_geom; DROP TABLE south",
    )
    .unwrap();
    drop(db);
    let read = open(&path);
    assert_eq!((read.read, read.table.shapes), (1, Shapes::Points(vec![Coord { x: 1.0, y: 2.0 }])));
}

#[test]
fn what_cannot_be_reached_is_an_error_not_a_crash() {
    for location in ["/vsizip/nowhere.zip", "PG:dbname=nowhere host=/nowhere"] {
        let source = Source { path: location.into(), location: location.into(), layer: None };
        let error = read(&source, &Silent).unwrap_err().to_string();
        assert!(error.starts_with(location), "{error}");
    }
}
