//! What is said about tables of stations that leave doubt. All data is invented; cases are common practice of the
//! trade, no source.

#[path = "common/tables.rs"]
mod tables;

use homocline::input::{ColumnSpec, DeclinationSpec, InputError, InputReadings, NorthReference, StationSpec};
use homocline::input::{StructureSpec, readings};
use homocline::notice::{Notice, Severity};
use homocline::orientation::Measured;
use homocline::orientation::notation::Notation;
use homocline::station::Kind;
use homocline::table::Table;
use tables::bar_parted;

fn table(text: &str) -> Table {
    bar_parted("s.csv", text)
}

fn spec() -> StationSpec {
    StationSpec { file: "s.csv".into(), crs: Some("EPSG:32633".into()), ..StationSpec::default() }
}

fn bedding() -> StationSpec {
    let structure = Some(StructureSpec::Value("bedding".into()));
    StationSpec { columns: ColumnSpec { structure, ..ColumnSpec::default() }, ..spec() }
}

fn read(text: &str, spec: &StationSpec) -> InputReadings {
    readings(&table(text), spec).unwrap()
}

fn fails(text: &str, spec: &StationSpec) -> InputError {
    readings(&table(text), spec).unwrap_err()
}

fn told<'a>(out: &'a InputReadings, code: &str) -> Option<&'a Notice> {
    out.notices.iter().find(|n| n.code == code)
}

fn strikes(out: &InputReadings) -> Vec<f64> {
    out.measurements.measured.iter().map(|m| m.bearing().map_or(-1.0, |b| b.degrees())).collect()
}

#[test]
fn two_hands_in_one_source_are_said() {
    let mixed = "x|y|strike|dip|dipdir\n5e5|5e6|45|20|315\n5e5|5e6|90|20|0\n5e5|5e6|200|20|110\n5e5|5e6|45|20|";
    let out = read(mixed, &bedding());
    assert_eq!(strikes(&out), [225.0, 270.0, 20.0, 225.0]);
    assert_eq!(told(&out, "hands-mixed"), None, "all three are left-hand");
    let mixed = mixed.replace("200|20|110", "200|20|290");
    let out = read(&mixed, &bedding());
    assert_eq!(strikes(&out), [225.0, 270.0, 200.0, 45.0]);
    let said = told(&out, "hands-mixed").unwrap();
    assert_eq!((said.severity, said.place.row), (Severity::Warning, Some(4)));
    assert!(said.message.contains("1 row is right-hand (the first is row 4)"), "{}", said.message);
    assert!(said.message.contains("2 rows are left-hand (the first is row 2)"), "{}", said.message);
    // The strike alone has no unanimous rows to follow.
    assert!(told(&out, "right-hand-assumed").unwrap().message.contains("(1 row)"));
}

#[test]
fn a_strike_alone_follows_rows_that_agree() {
    let out = read("x|y|strike|dip|dipdir\n5e5|5e6|45|20|315\n5e5|5e6|90|20|0\n5e5|5e6|200|20|", &bedding());
    assert_eq!((strikes(&out), out.notation), (vec![225.0, 270.0, 20.0], Notation::LeftHand));
    let said = told(&out, "hand-from-rows").unwrap();
    assert!(said.message.contains("1 row has") && said.message.contains("left-hand, as in the 2"), "{}", said.message);
    assert_eq!((said.place.row, told(&out, "right-hand-assumed")), (Some(4), None));
    let declared = StationSpec { notation: Notation::RightHand, ..bedding() };
    let out = read("x|y|strike|dip|dipdir\n5e5|5e6|45|20|135\n5e5|5e6|200|20|", &declared);
    assert_eq!((strikes(&out), told(&out, "hand-from-rows")), (vec![45.0, 200.0], None));
    // Upright planes show no hand.
    let out = read("x|y|strike|dip|dipdir\n5e5|5e6|45|90|315\n5e5|5e6|200|20|", &bedding());
    assert_eq!((strikes(&out)[1], told(&out, "right-hand-assumed").is_some()), (200.0, true));
}

#[test]
fn a_row_with_a_plane_and_a_line_says_what_it_lost() {
    let header = "x|y|type|strike|dip|trend|plunge\n";
    let out = read(&format!("{header}5e5|5e6|bedding|45|30||\n5e5|5e6|bedding|45|30|100|20"), &spec());
    let said = told(&out, "plane-and-line").unwrap();
    assert_eq!((said.severity, said.place.row), (Severity::Warning, Some(3)));
    for words in ["1 row holds", "strike, dip", "trend, plunge", "the line left aside"] {
        assert!(said.message.contains(words), "{}", said.message);
    }
    assert!(said.hint.as_ref().unwrap().contains("[[stations]]"));
    let out = read(&format!("{header}5e5|5e6|lineation|45|30|100|20\n5e5|5e6|lineation|||100|20"), &spec());
    let said = told(&out, "plane-and-line").unwrap();
    assert!(said.message.contains("1 row holds") && said.message.contains("the plane left aside"), "{}", said.message);
    assert_eq!(strikes(&out), [100.0, 100.0]);
}

#[test]
fn hints_name_keys_that_area_files_have() {
    let out = read("x|y|type|strike|dipdir|trend|dip|plunge\n5e5|5e6|bedding|45|135||30|", &spec());
    let keys: Vec<_> = out.notices.iter().filter(|n| n.code == "column-guessed").map(|n| n.hint.clone()).collect();
    assert_eq!(keys.len(), 8);
    for hint in keys.into_iter().flatten() {
        let key = hint.rsplit(' ').next().unwrap();
        assert!(["x", "y", "structure", "azimuth", "dip"].contains(&key), "{hint}");
    }
    let e = fails("x|y|dipdir|dip_dir|dip\n5e5|5e6|45|45|3", &bedding());
    assert!(e.to_string().contains("equally good for dip direction"), "{e}");
    assert!(e.hint().unwrap().ends_with("key azimuth"));
}

#[test]
fn unknown_structures_are_told_what_to_write() {
    let out = read("x|y|type|azimuth|dip\n5e5|5e6|Zed|45|30\n5e5|5e6|beding|45|30", &spec());
    let reason = |i: usize| out.refusals[i].reason.as_str();
    let form = r#"[structures]: "Zed" = { name = "zed", kind = "planar" } (or kind = "linear")"#;
    assert!(reason(0).ends_with(form), "{}", reason(0));
    assert!(reason(1).contains("did you mean \"bedding\"?"), "{}", reason(1));
    let mut mapped = spec();
    mapped.structures.insert("bedding".into(), "foliatoin".into());
    mapped.structures.insert("J7".into(), "joint".into());
    let out = read("x|y|type|azimuth|dip\n5e5|5e6|bedding|45|30", &mapped);
    let reason = out.refusals[0].reason.as_str();
    assert!(reason.starts_with("\"foliatoin\" is no structure known here"), "{reason}");
    assert!(reason.contains("did you mean \"foliation\"?"), "{reason}");
    let unmet = told(&out, "structure-unmet").unwrap();
    assert_eq!(unmet.severity, Severity::Info);
    assert!(unmet.message.ends_with(": \"J7\""), "{}", unmet.message);
    // Where the columns tell the kind, the target is named all the same.
    let out = read("x|y|type|strike|dip\n5e5|5e6|bedding|45|30", &mapped);
    let said = told(&out, "structure-kind-assumed").unwrap();
    assert!(said.message.starts_with("\"foliatoin\" is no"), "{}", said.message);
    assert!(said.hint.as_ref().unwrap().contains("\"foliation\""));
    // What the hint says works.
    let mut own = spec();
    own.structures.insert("Zed".into(), "zed".into());
    own.kinds.insert("zed".into(), Kind::Planar);
    let out = read("x|y|type|azimuth|dip\n5e5|5e6|Zed|45|30", &own);
    assert!(
        matches!(out.measurements.measured[..], [Measured::Plane { .. }]) && told(&out, "structure-unmet").is_none()
    );
}

#[test]
fn names_of_columns_are_checked_first() {
    let text = "x|y|strike|dip\n5e5|5e6|45|30";
    let with = |set: fn(&mut ColumnSpec)| {
        let mut s = bedding();
        set(&mut s.columns);
        fails(text, &s)
    };
    for (e, key) in [
        (with(|c| c.x = Some("east".into())), "x"),
        (with(|c| c.y = Some("east".into())), "y"),
        (with(|c| c.id = Some("east".into())), "id"),
        (with(|c| c.dip = Some("east".into())), "dip"),
        (with(|c| c.weight = Some("east".into())), "weight"),
    ] {
        let want = format!("s.csv: there is no column \"east\" (key {key}); the columns are: x, y, strike, dip");
        assert_eq!(e.to_string(), want);
    }
    let e = with(|c| (c.x, c.y) = (Some("x".into()), Some("x".into())));
    assert_eq!(
        (e.fault.code(), e.to_string().as_str()),
        ("column-named-twice", "s.csv: keys x and y both name column \"x\"")
    );
    let e = with(|c| (c.azimuth, c.dip) = (Some("dip".into()), Some("dip".into())));
    assert_eq!(e.fault.code(), "column-named-twice");
}

#[test]
fn columns_are_found_by_more_names_or_said_to_be_near() {
    let out = read("STATION_ID|x|y|ROCK_STRUCT|Strk|DIP_DIR|dp\nA|5e5|5e6|bedding|45|135|30", &spec());
    assert_eq!(out.measurements.station_id.get(0), Some("A"));
    assert_eq!(strikes(&out), [45.0]);
    let out = read("x|y|STRUCT_TYPE|DipDir|dip\n5e5|5e6|bedding|135|30", &spec());
    assert_eq!(strikes(&out), [45.0]);
    let e = fails("x|y|struct_of_rock|strike|dip\n5e5|5e6|bedding|45|30", &spec());
    assert!(e.hint().unwrap().ends_with("the nearest: struct_of_rock"), "{:?}", e.hint());
    let e = fails("x|y|strike|dip_measured|colour\n5e5|5e6|45|30|red", &bedding());
    assert!(e.hint().unwrap().ends_with("key dip; the nearest: dip_measured"), "{:?}", e.hint());
}

#[test]
fn refused_numbers_are_shown_in_the_reason() {
    let out = read("x|y|strike|dip\n500.000,25|5e6|45|30\n1e300|5e6|45|30\n|5e6|45|30\n5e5|5e6|1e300|30", &bedding());
    let reasons: Vec<&str> = out.refusals.iter().map(|r| r.reason.as_str()).collect();
    assert!(reasons[0].starts_with("x \"500.000,25\" is not a number"), "{}", reasons[0]);
    assert!(reasons[1].starts_with("x: coordinate 1e300 is outside"), "{}", reasons[1]);
    assert_eq!(reasons[2], "the row has no position: x is blank");
    assert!(reasons[3].starts_with("strike 1e300 is not an azimuth"), "{}", reasons[3]);
    let out = read("x|y|strike|dip\n5e5|5e6|45|weird thing, \"q\"", &bedding());
    assert!(out.refusals[0].reason.starts_with(r#""weird thing, \"q\"" is not a dip"#), "{}", out.refusals[0].reason);
}

#[test]
fn dates_outside_the_models_and_years_alone() {
    let dated = |date: Option<&str>| StationSpec {
        north: Some(NorthReference::Magnetic),
        declination: Some(DeclinationSpec::Model),
        date: date.map(str::to_owned),
        notation: Notation::RightHand,
        ..bedding()
    };
    let text = "x|y|strike|dip|date\n5e5|5e6|45|30|1 Jan 2050\n5e5|5e6|45|30|2023\n5e5|5e6|45|30|06/07/23\n5e5|5e6||0|1 Jan 2050\n5e5|5e6|45|30|6 July 2023";
    let out = read(text, &dated(None));
    let [late, short] = out.refusals.as_slice() else { panic!("{:?}", out.refusals) };
    assert_eq!(
        (late.code, late.column.as_deref(), late.value.as_deref()),
        ("no-declination-model", Some("date"), Some("1 Jan 2050"))
    );
    assert!(late.reason.contains("2050-01-01") && late.reason.contains("1900 to 2029"), "{}", late.reason);
    assert!(short.reason.contains("four digits"), "{}", short.reason);
    assert_eq!(out.measurements.year[0], 2023.5);
    assert!((out.measurements.year[2] - (2023.0 + 186.0 / 365.0)).abs() < 1e-9);
    let said = told(&out, "year-only").unwrap();
    assert_eq!((said.place.row, said.place.column.as_deref()), (Some(3), Some("date")));
    let out = read("x|y|strike|dip\n5e5|5e6|45|30", &dated(Some("2023")));
    assert_eq!((out.measurements.year[0], told(&out, "year-only").is_some()), (2023.5, true));
    assert!(fails("x|y|strike|dip\n5e5|5e6|45|30", &dated(Some("6/7/23"))).hint().unwrap().contains("four digits"));
}

#[test]
fn odd_positions_are_said() {
    let out = read("x|y|strike|dip\n15.1|47.2|45|30\n0|0|45|30\n5e5|5.2e6|45|30", &bedding());
    let degrees = told(&out, "position-in-degrees").unwrap();
    assert_eq!((degrees.severity, degrees.place.row), (Severity::Warning, Some(2)));
    assert!(degrees.message.starts_with("1 row of 3") && degrees.message.contains("15.1, 47.2"), "{}", degrees.message);
    let zero = told(&out, "position-zero").unwrap();
    assert_eq!((zero.severity, zero.place.row), (Severity::Warning, Some(3)));
    let geographic = StationSpec { crs: Some("EPSG:4326".into()), ..bedding() };
    let out = read("x|y|strike|dip\n15.1|47.2|45|30\n0|0|45|30", &geographic);
    assert!(told(&out, "position-in-degrees").is_none() && told(&out, "position-zero").is_some());
}

#[test]
fn exchanged_longitudes_and_latitudes_are_said() {
    let geographic = StationSpec { crs: Some("EPSG:4326".into()), ..bedding() };
    let e = fails("x|y|strike|dip\n-30.5|115.2|45|30\n-30.6|115.3|45|30", &geographic);
    assert_eq!(e.fault.code(), "position-swapped");
    let text = e.to_string();
    assert!(text.contains("2 of 2 rows") && text.contains("row 2: y: latitude 115.2 is outside -90 to 90"), "{text}");
    assert!(e.hint().unwrap().contains("exchange"));
    let out = read("x|y|strike|dip\n-30.5|115.2|45|30\n115.2|-30.6|45|30", &geographic);
    assert_eq!((out.refusals[0].code, out.refusals[0].row), ("position-swapped", 2));
    assert!(out.refusals[0].reason.contains("exchanged"));
}

#[test]
fn a_rake_says_from_where_it_counts() {
    let left = StationSpec { notation: Notation::LeftHand, ..spec() };
    let out = read("x|y|type|strike|dip|rake\n5e5|5e6|slickenline|180|60|0", &left);
    assert_eq!(strikes(&out), [0.0]);
    let said = told(&out, "rake-from-right-hand-strike").unwrap();
    assert!(said.message.contains("1 row gives") && said.message.contains("right-hand strike"), "{}", said.message);
}

#[test]
fn one_row_has_and_two_rows_have() {
    let of = |rows: &str| {
        let out = read(&format!("x|y|strike|dip|polarity\n{rows}"), &bedding());
        told(&out, "polarity-unclear").unwrap().message.clone()
    };
    assert!(of("5e5|5e6|45|30|maybe").starts_with("1 row has a polarity"));
    assert!(of("5e5|5e6|45|30|maybe\n5e5|5e6|45|30|maybe").starts_with("2 rows have a polarity"));
}
