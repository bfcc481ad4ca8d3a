//! Bad input ends in one clear message and leaves nothing half-written. All data is invented.

mod common;

use common::{AREA, Area, STATIONS, Said};

/// Runs `area.toml` and expects it to stop, saying each of `words`, with nothing written.
fn stops(area: &Area, words: &[&str]) -> Said {
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 2, "stdout: {}\nstderr: {}", said.out, said.err);
    let errors: Vec<&str> = said.err.lines().filter(|l| l.starts_with("error:")).collect();
    assert_eq!(errors.len(), 1, "one message: {}", said.err);
    for word in words {
        assert!(errors[0].contains(word), "\"{word}\" is missing in: {}", errors[0]);
    }
    assert!(!said.err.contains("panicked"), "{}", said.err);
    assert!(area.nothing_in("out"), "something was written");
    said
}

/// Runs `area.toml` on [`STATIONS`] with one more row, and expects that row to be refused, saying `words`.
fn refuses(row: &[u8], words: &[&str]) {
    let area = Area::with(&[("area.toml", AREA)]);
    let mut bytes = STATIONS.as_bytes().to_vec();
    bytes.extend_from_slice(row);
    bytes.push(b'\n');
    area.put("stations.csv", bytes);
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 0, "{}", said.err);
    let summary = area.summary("out");
    let counts = &summary["run"]["counts"];
    assert_eq!(
        (counts["read"].as_u64(), counts["kept"].as_u64(), counts["refused"].as_u64()),
        (Some(7), Some(6), Some(1))
    );
    let refusal = &summary["refusals"][0];
    assert_eq!(refusal["source"], "stations.csv");
    assert_eq!(refusal["row"], 8, "the header is line 1");
    let text = refusal.to_string();
    for word in words {
        assert!(text.contains(word), "\"{word}\" is missing in: {text}");
    }
    assert_eq!(area.homocline(&["run", "area.toml", "--strict"]).code, 1);
    assert_eq!(area.homocline(&["check", "area.toml"]).code, 1);
}

#[test]
fn a_missing_area_file() {
    stops(&Area::new(), &["area.toml", "cannot be read"]);
}

#[test]
fn a_missing_station_file() {
    stops(&Area::with(&[("area.toml", AREA)]), &["stations.csv"]);
}

#[test]
fn an_empty_file() {
    stops(&Area::with(&[("area.toml", AREA), ("stations.csv", "")]), &["stations.csv", "empty"]);
}

#[test]
fn a_header_and_nothing_else() {
    stops(
        &Area::with(&[("area.toml", AREA), ("stations.csv", "id,x,y,structure,strike,dip\n")]),
        &["stations.csv", "no rows"],
    );
}

#[test]
fn no_dip_column() {
    let text = STATIONS.replace(",dip\n", ",inclin_of_nothing\n").replace("inclin_of_nothing", "colour");
    stops(&Area::with(&[("area.toml", AREA), ("stations.csv", &text)]), &["stations.csv", "dip", "colour"]);
}

#[test]
fn a_wrong_crs() {
    let toml = AREA.replace("EPSG:32633", "EPSG:999999");
    stops(&Area::with(&[("area.toml", &toml), ("stations.csv", STATIONS)]), &["EPSG:999999"]);
}

#[test]
fn no_crs_at_all() {
    let toml = AREA.replace("crs = \"EPSG:32633\"\n", "");
    stops(&Area::with(&[("area.toml", &toml), ("stations.csv", STATIONS)]), &["stations.csv", "crs"]);
}

#[test]
fn text_in_a_number() {
    refuses(b"g,500700,5400300,bedding,12,steep", &["\"dip\"", "steep"]);
}

#[test]
fn a_nan() {
    refuses(b"g,500700,5400300,bedding,NaN,30", &["\"strike\"", "NaN"]);
}

#[test]
fn a_number_beyond_all_bounds() {
    refuses(b"g,1e308,5400300,bedding,12,30", &["1e308"]);
    refuses(b"g,500700,5400300,bedding,1e308,30", &["\"strike\"", "1e308"]);
    refuses(b"g,1e400,5400300,bedding,12,30", &["1e400"]);
}

#[test]
fn a_code_for_a_missing_value() {
    refuses(b"g,500700,5400300,bedding,12,-99", &["\"dip\"", "-99"]);
}

#[test]
fn half_a_utf8_character() {
    refuses(b"\xc3,500700,5400300,bedding,12,30", &["UTF-8"]);
}

#[test]
fn a_ragged_row() {
    refuses(b"g,500700,5400300,bedding", &["4", "6"]);
}

#[test]
fn polygons_that_are_points() {
    let points = r#"{"type":"FeatureCollection","features":[{"type":"Feature","properties":{"name":"n"},"geometry":{"type":"Point","coordinates":[15,48]}}]}"#;
    let toml = format!("{AREA}[domains]\npolygons = \"p.geojson\"\n");
    stops(
        &Area::with(&[("area.toml", &toml), ("stations.csv", STATIONS), ("p.geojson", points)]),
        &["p.geojson", "point"],
    );
}

#[test]
fn two_polygons_of_one_name() {
    let square = |x: f64| {
        format!(
            r#"{{"type":"Feature","properties":{{"name":"n"}},"geometry":{{"type":"Polygon","coordinates":[[[{x},48.7],[{0},48.7],[{0},48.8],[{x},48.8],[{x},48.7]]]}}}}"#,
            x + 0.1
        )
    };
    let both = format!(r#"{{"type":"FeatureCollection","features":[{},{}]}}"#, square(15.0), square(15.2));
    let toml = format!("{AREA}[domains]\npolygons = \"p.geojson\"\n");
    let area = Area::with(&[("area.toml", &toml), ("stations.csv", STATIONS), ("p.geojson", &both)]);
    stops(&area, &["p.geojson", "\"n\"", "same_name"]);
    area.put("area.toml", format!("{toml}same_name = \"merge\"\n"));
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 0, "{}", said.err);
    assert_eq!(area.summary("out")["domains"].as_array().unwrap().len(), 1);
}

#[test]
fn an_unknown_key_or_value() {
    let toml = format!("{AREA}[domains]\npolygon = \"x\"\n");
    stops(&Area::with(&[("area.toml", &toml), ("stations.csv", STATIONS)]), &["area.toml, line 6", "\"polygons\""]);
    let toml = AREA.replace("\"true\"", "\"magnetc\"");
    stops(&Area::with(&[("area.toml", &toml), ("stations.csv", STATIONS)]), &["magnetc", "magnetic"]);
}

#[test]
fn an_output_folder_that_cannot_be_made() {
    let area = Area::with(&[("area.toml", AREA), ("stations.csv", STATIONS), ("out", "a file, not a folder")]);
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 2);
    assert!(said.err.contains("output folder") && said.err.contains("out"), "{}", said.err);
    assert_eq!(std::fs::read_to_string(area.path("out")).unwrap(), "a file, not a folder");
    // /proc takes no folders from anyone, root included.
    let said = area.homocline(&["run", "area.toml", "--out", "/proc/homocline"]);
    assert_eq!(said.code, 2);
    assert!(said.err.contains("/proc/homocline"), "{}", said.err);
}

#[test]
fn an_output_that_would_overwrite_an_input() {
    let area = Area::with(&[("area.toml", AREA), ("stations.csv", STATIONS)]);
    assert_eq!(area.homocline(&["run", "area.toml"]).code, 0);
    let before = std::fs::read(area.path("out/area.gpkg")).unwrap();
    area.put("area.toml", format!("{AREA}[domains]\npolygons = \"out/area.gpkg:domains\"\n"));
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 2, "{}", said.err);
    assert!(said.err.contains("would be overwritten") && said.err.contains("--out"), "{}", said.err);
    assert_eq!(std::fs::read(area.path("out/area.gpkg")).unwrap(), before);
    assert_eq!(area.homocline(&["run", "area.toml", "--out", "again"]).code, 0);
}

/// A limit on the size of files stands in for a full disk: the kernel refuses the write in the same way.
#[test]
fn a_full_disk() {
    let area = Area::with(&[("area.toml", AREA), ("stations.csv", STATIONS)]);
    let program = env!("CARGO_BIN_EXE_homocline");
    for blocks in [1, 8, 64, 128] {
        let script = format!("trap '' XFSZ; ulimit -f {blocks}; exec '{program}' run area.toml");
        let output =
            std::process::Command::new("bash").args(["-c", &script]).current_dir(area.path("")).output().unwrap();
        let err = String::from_utf8_lossy(&output.stderr).into_owned();
        assert_eq!(output.status.code(), Some(2), "{blocks} KiB: {err}");
        assert!(err.contains("error:") && err.contains("out"), "{blocks} KiB: {err}");
        assert!(area.nothing_in("out"), "{blocks} KiB left something behind");
    }
}
