//! What the program says: exit status, quiet, JSON, help. All data is invented.

mod common;

use common::{AREA, Area, STATIONS};

fn good() -> Area {
    Area::with(&[("area.toml", AREA), ("stations.csv", STATIONS)])
}

fn with_a_bad_row() -> Area {
    let area = good();
    area.put("stations.csv", format!("{STATIONS}g,500700,5400300,bedding,12,-99\n"));
    area
}

#[test]
fn exit_status_follows_what_was_found() {
    let area = good();
    assert_eq!(area.homocline(&["run", "area.toml"]).code, 0);
    assert_eq!(area.homocline(&["run", "area.toml", "--strict"]).code, 0);
    assert_eq!(area.homocline(&["check", "area.toml"]).code, 0);
    let area = with_a_bad_row();
    assert_eq!(area.homocline(&["run", "area.toml"]).code, 0);
    assert_eq!(area.homocline(&["run", "area.toml", "--strict"]).code, 1);
    assert!(area.path("out/area.gpkg").exists(), "strict runs write, too");
    assert_eq!(area.homocline(&["check", "area.toml"]).code, 1);
    assert_eq!(area.homocline(&["check", "nowhere.toml"]).code, 2);
    assert_eq!(area.homocline(&["run"]).code, 2);
    assert_eq!(area.homocline(&["run", "--nonsense"]).code, 2);
}

#[test]
fn check_writes_nothing_and_lists_every_refused_row() {
    let area = good();
    let bad: String = (0..25).map(|i| format!("x{i},500700,5400300,bedding,12,-99\n")).collect();
    area.put("stations.csv", format!("{STATIONS}{bad}"));
    let said = area.homocline(&["check", "area.toml"]);
    assert_eq!(said.err.lines().filter(|l| l.starts_with("refused: stations.csv, row ")).count(), 25);
    assert!(said.out.contains("31 rows read, 6 would be kept, 25 refused"), "{}", said.out);
    assert!(area.nothing_in("out"));
}

#[test]
fn quiet_says_nothing_but_errors() {
    let area = with_a_bad_row();
    let said = area.homocline(&["run", "area.toml", "--quiet"]);
    assert_eq!((said.code, said.out.as_str(), said.err.as_str()), (0, "", ""));
    let said = area.homocline(&["run", "nowhere.toml", "--quiet"]);
    assert!(said.err.starts_with("error: nowhere.toml"), "{}", said.err);
}

#[test]
fn json_is_one_object_per_line_on_standard_output() {
    let area = with_a_bad_row();
    let said = area.homocline(&["run", "area.toml", "--format", "json"]);
    assert_eq!(said.err, "");
    let lines: Vec<serde_json::Value> = said.out.lines().map(|l| serde_json::from_str(l).expect(l)).collect();
    let with = |severity: &str| lines.iter().filter(|l| l["severity"] == severity).count();
    assert_eq!((with("refused"), with("result")), (1, 1));
    assert!(with("info") > 0, "guesses are said");
    let refused = lines.iter().find(|l| l["severity"] == "refused").unwrap();
    assert_eq!((&refused["row"], &refused["column"]), (&8.into(), &"dip".into()));
    let said = area.homocline(&["run", "nowhere.toml", "--format", "json"]);
    let error: serde_json::Value = serde_json::from_str(said.out.trim()).unwrap();
    assert_eq!(error["severity"], "error");
}

#[test]
fn nothing_is_drawn_in_a_pipe() {
    let said = good().homocline(&["run", "area.toml"]);
    assert!(!said.err.contains('\u{1b}') && !said.err.contains('\r'), "{:?}", said.err);
}

#[test]
fn no_area_file_is_needed() {
    let area =
        Area::with(&[("readings.csv", "lon,lat,structure,strike,dip\n15,48,bedding,10,30\n15.01,48,bedding,12,33\n")]);
    let said = area.homocline(&["run", "--stations", "readings.csv", "--out", "results"]);
    assert_eq!(said.code, 2, "longitude and latitude still need a CRS to be named: {}", said.out);
    assert!(said.err.contains("EPSG:4326"), "{}", said.err);
    let geojson = r#"{"type":"FeatureCollection","features":[{"type":"Feature","properties":{"structure":"bedding","strike":10,"dip":30},"geometry":{"type":"Point","coordinates":[15,48]}}]}"#;
    area.put("readings.geojson", geojson);
    let said = area.homocline(&["run", "--stations", "readings.geojson", "--out", "results"]);
    assert_eq!(said.code, 0, "{}", said.err);
    assert!(area.path("results/area.gpkg").exists());
    assert!(said.err.contains("UTM zone 33N"), "the map CRS chosen is said: {}", said.err);
}

#[test]
fn help_names_every_command_and_symbols_lists_the_catalogue() {
    let area = Area::new();
    let help = area.homocline(&["--help"]);
    assert_eq!(help.code, 0);
    for command in ["run", "check", "symbols"] {
        assert!(help.out.contains(command), "{}", help.out);
    }
    let symbols = area.homocline(&["symbols"]);
    for code in ["06.02", "04.03.02", "09.001"] {
        assert!(symbols.out.contains(code), "{}", symbols.out);
    }
}
