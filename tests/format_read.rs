//! Reading sources good and bad: what is kept, what is refused and on which line, and how a source that cannot be
//! read at all says so.

use geo_types::{Coord, Geometry};
use homocline::format::{FormatError, ReadTable, Source, read};
use homocline::notice::Silent;
use homocline::table::{Cell, Column, Shapes};
use std::path::Path;

fn source(path: &Path) -> Source {
    let name = path.file_name().unwrap().to_string_lossy().into_owned();
    Source { path: name, location: path.to_string_lossy().into_owned(), layer: None }
}

fn try_bytes(name: &str, bytes: &[u8]) -> Result<ReadTable, FormatError> {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join(name);
    std::fs::write(&path, bytes).unwrap();
    let read = read(&source(&path), &Silent);
    if let Ok(read) = &read {
        assert_eq!(read.read as usize, read.table.len() + read.refused.len());
        assert_eq!(read.table.rows.len(), read.table.len());
    }
    read
}

fn csv(text: impl AsRef<[u8]>) -> ReadTable {
    try_bytes("stations.csv", text.as_ref()).unwrap()
}

fn names(read: &ReadTable) -> Vec<&str> {
    read.table.fields.iter().map(|f| f.name.as_str()).collect()
}

fn column<'a>(read: &'a ReadTable, name: &str) -> Vec<Cell<'a>> {
    let column = read.table.column(name).unwrap_or_else(|| panic!("no column {name}"));
    (0..read.table.len()).map(|row| column.cell(row)).collect()
}

fn refusals(read: &ReadTable) -> Vec<(u64, &str)> {
    read.refused.iter().map(|r| (r.row, r.code)).collect()
}

fn codes(read: &ReadTable) -> Vec<&str> {
    read.notices.iter().map(|n| n.code).collect()
}

/// The error's message, which must name the file.
fn error(name: &str, bytes: &[u8]) -> String {
    let message = try_bytes(name, bytes).unwrap_err().to_string();
    assert!(message.starts_with(name), "{message}");
    message
}

#[test]
fn a_plain_table_is_read_with_its_line_numbers() {
    let read = csv("id, x ,note\n a ,1.5,\"two\nlines, and a \"\"quote\"\"\"\n\nb,,\nc,2, \n");
    assert_eq!(names(&read), ["id", "x", "note"]);
    assert_eq!(read.table.rows, [2, 5, 6]);
    assert_eq!(column(&read, "id"), [Cell::Text("a"), Cell::Text("b"), Cell::Text("c")]);
    assert_eq!(column(&read, "x"), [Cell::Text("1.5"), Cell::Null, Cell::Text("2")]);
    assert_eq!(column(&read, "note"), [Cell::Text("two\nlines, and a \"quote\""), Cell::Null, Cell::Null]);
    assert!(matches!(read.table.fields[1].column, Column::Text(_)));
    assert!(read.notices.is_empty() && !read.table.decimal_comma);
}

#[test]
fn every_line_end_counts_the_same() {
    for end in ["\n", "\r\n", "\r"] {
        let read = csv(["id,x", "a,1", "", "b,\"2", "2\"", "c,3", "d"].join(end));
        assert_eq!(read.table.rows, [2, 4, 6], "{end:?}");
        assert_eq!(refusals(&read), [(7, "too-few-cells")]);
    }
}

#[test]
fn a_byte_order_mark_is_no_part_of_the_first_name() {
    let read = csv("\u{feff}id,x\na,1\n");
    assert_eq!(names(&read), ["id", "x"]);
    for little in [true, false] {
        let units = "\u{feff}id;größe\r\nb;1\r\n".encode_utf16();
        let bytes: Vec<u8> = units.flat_map(|u| if little { u.to_le_bytes() } else { u.to_be_bytes() }).collect();
        let read = csv(bytes);
        assert_eq!((names(&read), read.table.rows[0]), (vec!["id", "größe"], 2));
        assert!(codes(&read).contains(&"encoding-decoded"));
    }
}

#[test]
fn semicolons_with_decimal_commas_are_recognised_and_said() {
    let read = csv("id;x;y;note\na;430000,5;5210000,25;\"a; b, c.\"\nb;430001;5210001,75;\n");
    assert_eq!(names(&read), ["id", "x", "y", "note"]);
    assert!(read.table.decimal_comma);
    assert_eq!(codes(&read), ["delimiter-guessed", "decimal-comma"]);
    let read = csv("id;x\na;1.5\nb;2.5\nc;2,5\n");
    assert!(!read.table.decimal_comma && codes(&read).contains(&"decimal-mark-mixed"));
    for (name, text) in [("a.tsv", "id\tx\na\t1\n"), ("a.txt", "id|x\na|1\n"), ("a.txt", "sep=;\nid;x\na;1\n")] {
        let read = try_bytes(name, text.as_bytes()).unwrap();
        assert_eq!((names(&read), column(&read, "x")), (vec!["id", "x"], vec![Cell::Text("1")]));
    }
}

#[test]
fn ragged_rows_are_refused_with_their_counts_and_the_others_kept() {
    let read = csv("id,x,y\na,1,2\nb,1\nc,1,2,3\nd,5,6\n");
    assert_eq!((read.read, read.table.rows.clone()), (4, vec![2, 5]));
    assert_eq!(refusals(&read), [(3, "too-few-cells"), (4, "too-many-cells")]);
    assert!(read.refused[0].reason.contains("2 cells") && read.refused[0].reason.contains("header has 3"));
    assert_eq!(read.refused[1].value.as_deref(), Some("c,1,2,3"));
}

#[test]
fn a_quote_that_is_never_closed_costs_one_row() {
    let read = csv("id,note\na,\"open\nb,fine\nc,fine\n");
    assert_eq!(refusals(&read), [(2, "quote-not-closed")]);
    assert_eq!((read.table.rows.clone(), read.read), (vec![3, 4], 3));
    // "Closed" by a later row's opening quote, which must not swallow that row in silence.
    let read = csv("id,note\na,\"open\nb,\"again\nc,fine\n");
    assert_eq!(refusals(&read), [(2, "quote-not-closed"), (3, "quote-not-closed")]);
    assert_eq!(read.table.rows, [4]);
}

#[test]
fn only_rows_that_are_not_utf8_are_refused() {
    let read = csv(b"id,note\na,ok\nb,gr\xf6\xdfe\nc,\xe2\x82\nd,\xc3\xb6\n");
    assert_eq!(refusals(&read), [(3, "not-utf8"), (4, "not-utf8")]);
    assert_eq!((read.refused[0].column.as_deref(), read.table.rows.clone()), (Some("note"), vec![2, 5]));
    // Half a character at the end of one cell, its other half at the start of the next.
    assert_eq!(refusals(&csv(b"id,note\na\xc3,\xb6b\nb,ok\n")), [(2, "not-utf8")]);
    let message = error("stations.csv", b"id,gr\xf6\xdfe\na,1\n");
    assert!(message.contains("header") && message.contains("UTF-8"), "{message}");
}

#[test]
fn binary_data_and_endless_lines_are_bounded() {
    let read = csv(b"id,x\na,1\nb,\x002\n");
    assert_eq!(refusals(&read), [(3, "nul-byte")]);
    assert!(error("photo.csv", b"PK\x03\x04\x00\x00,x\n").contains("binary"));
    let endless = [b"id,x\na,".to_vec(), vec![b'1'; 17 << 20]].concat();
    assert!(error("stations.csv", &endless).contains("line 2"));
    assert!(error("stations.csv", &vec![b'x'; 17 << 20]).contains("line 1"));
}

#[test]
fn odd_headers_are_put_right_and_said() {
    let read = csv("id,dip,dip,,\na,1,2,3,\nb,4,5,6,\n");
    assert_eq!(names(&read), ["id", "dip", "dip_2", "column_4"]);
    assert_eq!(codes(&read), ["header-repeated", "header-empty"]);
    assert!(read.notices[0].message.contains("\"dip\""));
    // The last column has neither name nor values: spreadsheets leave such.
    assert_eq!(column(&read, "column_4"), [Cell::Text("3"), Cell::Text("6")]);
    let read = csv("id,x\na,1\n,\n , \n");
    assert_eq!((read.read, codes(&read)), (1, vec!["blank-rows"]));
}

#[test]
fn a_source_without_rows_is_an_error() {
    assert!(error("stations.csv", b"").contains("empty"));
    assert!(error("stations.csv", b"\n\n").contains("empty"));
    assert!(error("stations.csv", b"id,x\n").contains("has a header but no rows"));
    assert!(error("a.geojson", b"").contains("empty"));
    assert!(error("a.geojson", br#"{"type":"FeatureCollection","features":[]}"#).contains("no features"));
    assert!(error("a.gpkg", b"").contains("empty"));
}

#[test]
fn a_source_that_is_not_there_or_not_a_file_says_so() {
    let folder = tempfile::tempdir().unwrap();
    for name in ["none.csv", "none.geojson", "none.shp", "none.gpkg", "none"] {
        let error = read(&source(&folder.path().join(name)), &Silent).unwrap_err();
        assert!(matches!(&error, FormatError::Missing { file } if file == name), "{error}");
    }
    let folder_error = read(&source(folder.path()), &Silent).unwrap_err();
    assert!(matches!(folder_error, FormatError::Directory { .. }), "{folder_error}");
    assert!(error("notes.docx", b"PK\x03\x04").contains("not a format"));
    assert!(error("area.gpkg", b"not a database").contains("GeoPackage"));
    assert!(error("area.zip", b"not a zip").contains("zipped"));
}

#[cfg(unix)]
#[test]
fn a_source_that_may_not_be_read_says_so() {
    use std::os::unix::fs::PermissionsExt;
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("stations.csv");
    std::fs::write(&path, "id,x\na,1\n").unwrap();
    std::fs::set_permissions(&path, std::fs::Permissions::from_mode(0o000)).unwrap();
    match read(&source(&path), &Silent) {
        // The superuser may read everything.
        Ok(read) => assert_eq!(read.read, 1),
        Err(error) => assert!(matches!(error, FormatError::Denied { .. }), "{error}"),
    }
}

#[test]
fn geojson_columns_take_the_type_of_their_values() {
    let read = try_bytes(
        "a.geojson",
        br#"{"type":"FeatureCollection","features":[
        {"type":"Feature","geometry":{"type":"Point","coordinates":[13.5,47.25,900]},
         "properties":{"n":1,"dip":20,"ok":true,"label":"030\/20","mixed":1.50,"note":null}},
        {"type":"Feature","geometry":null,"properties":{"n":2,"dip":20.5,"ok":null,"label":"\u00fc","mixed":"N"}},
        {"type":"Feature","id":7,"geometry":{"type":"MultiPoint","coordinates":[[1,2]]},"properties":null}]}"#,
    )
    .unwrap();
    assert_eq!(names(&read), ["n", "dip", "ok", "label", "mixed", "note", "id"]);
    assert_eq!(column(&read, "n"), [Cell::Integer(1), Cell::Integer(2), Cell::Null]);
    assert_eq!(column(&read, "dip"), [Cell::Real(20.0), Cell::Real(20.5), Cell::Null]);
    assert_eq!(column(&read, "ok"), [Cell::Boolean(true), Cell::Null, Cell::Null]);
    assert_eq!(column(&read, "label"), [Cell::Text("030/20"), Cell::Text("ü"), Cell::Null]);
    assert_eq!(column(&read, "mixed"), [Cell::Text("1.5"), Cell::Text("N"), Cell::Null]);
    assert_eq!(column(&read, "id")[2], Cell::Integer(7));
    assert_eq!((read.table.rows.clone(), read.table.crs.as_deref()), (vec![0, 1, 2], Some("EPSG:4326")));
    let Shapes::Points(points) = &read.table.shapes else { panic!("not points") };
    assert_eq!(
        (points[0], points[1].x.is_nan(), points[2]),
        (Coord { x: 13.5, y: 47.25 }, true, Coord { x: 1.0, y: 2.0 })
    );
}

#[test]
fn a_bad_geojson_feature_costs_no_other() {
    let read = try_bytes(
        "a.json",
        br#"{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::32633"}},
        "features":[
        {"type":"Feature","geometry":{"type":"Polygon","coordinates":[[[0,0],[1,0],[1],[0,0]]]},"properties":{}},
        {"type":"Feature","geometry":{"type":"Sphere","coordinates":[0,0]},"properties":{}},
        {"type":"Feature","geometry":{"type":"Polygon","coordinates":[[[0,0],[9,0],[9,9],[0,0]]]},"properties":{"name":"A"}},
        {"type":"Feature","geometry":{"type":"Point","coordinates":[1,1e999]},"properties":{}},
        {"kind":"none"}]}"#,
    )
    .unwrap();
    assert_eq!((read.read, read.table.rows.clone(), read.table.crs.as_deref()), (5, vec![2], Some("EPSG:32633")));
    assert_eq!(read.refused.iter().map(|r| r.row).collect::<Vec<_>>(), [0, 1, 3, 4]);
    assert!(matches!(&read.table.shapes, Shapes::Any(s) if matches!(s[0], Some(Geometry::Polygon(_)))));
}

#[test]
fn json_that_is_cut_off_or_something_else_says_so() {
    let cut = error("a.geojson", br#"{"type":"FeatureCollection","features":[{"type":"Fea"#);
    assert!(cut.contains("GeoJSON") && cut.contains("line 1"), "{cut}");
    assert!(error("a.json", b"{\"a\": 1}").contains("not a format"));
    assert!(error("a.json", b"{\"type\": \"FeatureCollection\", \"features\": [\"\xff\"]}").contains("UTF-8"));
    let lone = try_bytes("a.geojson", br#"{"type":"Point","coordinates":[1,2]}"#).unwrap();
    assert_eq!((lone.read, lone.table.fields.len()), (1, 0));
}
