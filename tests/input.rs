//! Tables of stations to readings. Cases without a source beside them are common practice of the trade, no source.

#[path = "common/tables.rs"]
mod tables;

use homocline::input::{
    ColumnSpec, DeclinationSpec, InputError, InputReadings, NorthReference, StationSpec, StructureSpec, readings,
};
use homocline::notice::Severity;
use homocline::orientation::notation::Notation;
use homocline::orientation::{Measured, Polarity};
use homocline::station::{Declination, Kind, North};
use homocline::table::{Column, Shapes, Table};
use proptest::prelude::*;
use tables::bar_parted;

fn csv(text: &str) -> Table {
    bar_parted("stations.csv", text)
}

fn spec() -> StationSpec {
    StationSpec { file: "stations.csv".into(), crs: Some("EPSG:32633".into()), ..StationSpec::default() }
}

fn bedding(notation: Notation) -> StationSpec {
    let structure = Some(StructureSpec::Value("bedding".into()));
    StationSpec { notation, columns: ColumnSpec { structure, ..ColumnSpec::default() }, ..spec() }
}

fn read(text: &str, spec: &StationSpec) -> InputReadings {
    let table = csv(text);
    let out = readings(&table, spec).unwrap();
    assert_eq!(out.measurements.measured.len() + out.refusals.len(), table.len(), "rows were lost");
    out
}

fn fails(text: &str, spec: &StationSpec) -> InputError {
    readings(&csv(text), spec).unwrap_err()
}

fn angles(out: &InputReadings) -> Vec<(f64, f64)> {
    let one = |m: &Measured| match *m {
        Measured::Plane { strike, dip } => (strike.map_or(-1.0, |s| s.degrees()), dip.degrees()),
        Measured::Line { trend, plunge } => (trend.degrees(), plunge.degrees()),
    };
    out.measurements.measured.iter().map(one).collect()
}

fn codes(out: &InputReadings) -> Vec<(u64, &str)> {
    out.refusals.iter().map(|r| (r.row, r.code)).collect()
}

fn told(out: &InputReadings, code: &str) -> Option<String> {
    out.notices.iter().find(|n| n.code == code).map(|n| n.message.clone())
}

#[test]
fn a_plain_table_is_read_and_every_guess_is_said() {
    let out =
        read("station|easting|northing|type|strike|dip\nA1|430001|2|Bedding|045|45\nA2|430003|4|S0|225|30", &spec());
    assert_eq!(angles(&out), [(45.0, 45.0), (225.0, 30.0)]);
    assert_eq!(out.notation, Notation::RightHand);
    assert_eq!(out.measurements.station_id.get(1), Some("A2"));
    assert_eq!(out.measurements.source_row, [2, 3]);
    assert_eq!(out.measurements.structures.len(), 1);
    assert!(told(&out, "north-assumed").is_some() && told(&out, "right-hand-assumed").is_some());
    let guessed: Vec<_> = out.columns.iter().map(|c| (c.key, c.column.as_str(), c.guessed)).collect();
    assert_eq!(
        guessed,
        [
            ("x", "easting", true),
            ("y", "northing", true),
            ("structure", "type", true),
            ("id", "station", true),
            ("strike", "strike", true),
            ("dip", "dip", true)
        ]
    );
    assert_eq!(out.notices.iter().filter(|n| n.code == "column-guessed").count(), 6);
    assert!(out.notices.iter().all(|n| n.severity == Severity::Info), "{:?}", out.notices);
}

#[test]
fn each_notation_gives_the_same_plane() {
    for (notation, text) in [
        (Notation::Auto, "x|y|strike|dip\n1|2|045|45"),
        (Notation::RightHand, "x|y|azimuth|dip\n1|2|045|45"),
        (Notation::LeftHand, "x|y|strike|dip\n1|2|225|45"),
        (Notation::DipDirection, "x|y|azimuth|dip\n1|2|135|45"),
        (Notation::Auto, "x|y|DipDirecti|Dip\n1|2|135|45"),
        (Notation::Auto, "x|y|strike_lhr|dip\n1|2|225|45"),
        (Notation::Quadrant, "x|y|strike|dip|dip_quadrant\n1|2|225|45|SE"),
        (Notation::Auto, "x|y|strike|dip|quadrant\n1|2|225|45|SE"),
        (Notation::Auto, "x|y|strike|dip\n1|2|N45E|45 SE"),
        (Notation::Auto, "x|y|strike|dip|quad\n1|2|S45W|45|se"),
        (Notation::Auto, "x|y|strike|dip_dir|dip\n1|2|225|135|45"),
        (Notation::Auto, "x|y|strike|dip_dir|dip\n1|2|45|137|45"),
        (Notation::Auto, "x|y|attitude\n1|2|N45E 45SE"),
        (Notation::Auto, "x|y|attitude\n1|2|045/45"),
        (Notation::Auto, "x|y|attitude\n1|2|135->45"),
        (Notation::RightHand, "x|y|attitude\n1|2|135→45"),
        (Notation::DipDirection, "x|y|attitude\n1|2|135/45"),
        (Notation::LeftHand, "x|y|attitude\n1|2|225/45"),
        (Notation::Auto, "x|y|Streichen|Fallen\n1|2|45|45"),
        (Notation::Auto, "x|y|strike (°)|dip (deg)\n1|2|45|45"),
    ] {
        let out = read(text, &bedding(notation));
        assert_eq!(angles(&out), [(45.0, 45.0)], "{notation:?} {text} {:?}", out.refusals);
    }
}

#[test]
fn the_notation_of_a_source_comes_from_its_evidence() {
    let out =
        read("x|y|strike|dip|quadrant\n1|2|225|45|SE\n1|3|10|30|\n1|4|20|90|\n1|5|20|0|", &bedding(Notation::Auto));
    assert_eq!(out.notation, Notation::Quadrant);
    assert_eq!(codes(&out), [(3, "dip-quadrant-missing")]);
    let out2 = read("x|y|attitude\n1|2|225->45\n1|3|135->30\n1|4|100/20", &bedding(Notation::Auto));
    assert_eq!(
        (out2.notation, angles(&out2)),
        (Notation::DipDirection, vec![(135.0, 45.0), (45.0, 30.0), (10.0, 20.0)])
    );
    assert!(told(&out2, "right-hand-assumed").is_none());
    let e = fails("x|y|DipDir|dip\n1|2|225|45", &bedding(Notation::RightHand));
    assert_eq!(e.fault.code(), "notation-disagrees");
    let mut named = bedding(Notation::RightHand);
    named.columns.azimuth = Some("DipDir".into());
    let out3 = read("x|y|DipDir|dip\n1|2|225|45", &named);
    assert_eq!(angles(&out3), [(225.0, 45.0)]);
    assert!(told(&out3, "notation-and-name-differ").is_some());
}

#[test]
fn bad_rows_are_refused_by_name_and_good_rows_kept() {
    let text = "id|x|y|structure|strike|dip|weight
        1|1|2|bedding|45|45|1
        2|1|2|bedding|45|-99|1
        3|1|2|bedding|-99|45|1
        4|1|2|bedding|45|steep|1
        5|1|2|bedding|NaN|45|1
        6|1|2|bedding|45|1e308|1
        7|1|2|bedding|45|120|1
        8|1|2|bedding|-45|30|1
        9|1|2|bedding|800|30|1
        10|1|2|bedding||30|1
        11|1|2|bedding||0|1
        12|1|2|bedding|45||1
        13||2|bedding|45|45|1
        14|1e308|2|bedding|45|45|1
        15|east|2|bedding|45|45|1
        16|inf|2|bedding|45|45|1
        17|-9999|2|bedding|45|45|1
        18|1|2||45|45|1
        19|1|2|mystery stuff|45|45|1
        20|1|2|bedding|45|45|0
        21|1|2|bedding|45|45|-1
        22|1|2|bedding|45|45|1e7
        23|1|2|bedding|45|45|nan
        24|1|2|bedding|45|45|
        25|1|2|bedding|405|45|2
        26|1|2|lineation|200|20|1
        27|1|2|lineation|200|-20|1";
    let out = read(text, &spec());
    assert_eq!(
        codes(&out),
        [
            (3, "missing-value-code"),
            (4, "missing-value-code"),
            (5, "not-a-number"),
            (6, "not-finite"),
            (7, "dip-out-of-range"),
            (8, "dip-out-of-range"),
            (9, "azimuth-negative"),
            (10, "azimuth-out-of-range"),
            (11, "azimuth-missing"),
            (13, "dip-missing"),
            (14, "position-missing"),
            (15, "position-out-of-range"),
            (16, "not-a-number"),
            (17, "not-finite"),
            (18, "missing-value-code"),
            (19, "structure-missing"),
            (20, "structure-kind-unknown"),
            (21, "weight-out-of-range"),
            (22, "weight-out-of-range"),
            (23, "weight-out-of-range"),
            (24, "not-finite"),
            (28, "plunge-negative"),
        ]
    );
    assert_eq!(angles(&out), [(45.0, 45.0), (-1.0, 0.0), (45.0, 45.0), (45.0, 45.0), (200.0, 20.0)]);
    assert_eq!(out.measurements.weight, [1.0, 1.0, 1.0, 2.0, 1.0]);
    let first = &out.refusals[0];
    assert_eq!(
        (first.source.as_str(), first.column.as_deref(), first.value.as_deref()),
        ("stations.csv", Some("dip"), Some("-99"))
    );
    assert_eq!(first.reason, "-99 is a code for a missing value, not a dip");
    assert!(out.refusals[5].reason.contains("dip 60 and polarity overturned"), "{}", out.refusals[5].reason);
    assert!(told(&out, "azimuth-wrapped").unwrap().contains("405"));
    for refusal in &out.refusals {
        assert!(refusal.column.is_some() && refusal.value.is_some() && !refusal.reason.is_empty(), "{refusal:?}");
    }
}

#[test]
fn contradictions_are_refused_with_both_values() {
    let auto = bedding(Notation::Auto);
    let out = read("x|y|strike|dip|quadrant\n1|2|45|45|NE\n1|2|45|45|SE", &auto);
    assert_eq!(codes(&out), [(2, "dip-quadrant-contradicts")]);
    assert!(out.refusals[0].reason.contains("strike 45") && out.refusals[0].reason.contains("NE"));
    let out = read("x|y|strike|dipdir|dip\n1|2|45|60|45\n1|2|45|60|0\n1|2|45|130|45\n1|2|45||45\n1|2||135|45", &auto);
    assert_eq!(codes(&out), [(2, "strike-contradicts-dip-direction")]);
    assert!(out.refusals[0].reason.contains("strike 45") && out.refusals[0].reason.contains("direction 60"));
    assert_eq!(angles(&out), [(45.0, 0.0), (45.0, 45.0), (45.0, 45.0), (45.0, 45.0)]);
    let out = read("x|y|strike|dipdir|dip\n1|2|45|315|45", &bedding(Notation::RightHand));
    assert_eq!(codes(&out), [(2, "strike-contradicts-dip-direction")]);
    let text = "x|y|strike|dipdir|dip\n1|2|45|315|45\n1|2|45||45\n1|2||315|45";
    let out = read(text, &bedding(Notation::DipDirection));
    assert_eq!((angles(&out), codes(&out)), (vec![(225.0, 45.0), (225.0, 45.0)], vec![(3, "dip-quadrant-missing")]));
    let out = read("x|y|attitude\n1|2|N45E 45NE\n1|2|\n1|2|tbd", &auto);
    assert_eq!(codes(&out), [(2, "dip-quadrant-contradicts"), (3, "attitude-missing"), (4, "attitude-unreadable")]);
}

#[test]
fn a_table_that_cannot_be_read_says_what_is_missing() {
    let auto = bedding(Notation::Auto);
    for (text, spec, code, words) in [
        ("x|y|strike\n1|2|3", auto.clone(), "column-missing", "dip or plunge; the columns are: x, y, strike"),
        ("x|y|dip\n1|2|3", auto.clone(), "column-missing", "strike, dip direction or trend"),
        ("strike|dip\n1|2", auto.clone(), "column-missing", "where a station is"),
        ("x|y|strike|dip\n1|2|3|4", spec(), "structure-column-missing", "which structure"),
        (
            "x|y|strike|Strike|dip\n1|2|3|3|4",
            auto.clone(),
            "column-ambiguous",
            "strike, Strike are equally good for strike",
        ),
        ("x|y|easting|northing|strike|dip\n1|2|3|3|4|5", auto.clone(), "column-ambiguous", "easting / northing, x / y"),
        (
            "x|y|strike|dip\n1|2|3|4",
            StationSpec { crs: None, ..auto.clone() },
            "crs-missing",
            "coordinate reference system",
        ),
        (
            "x|y|strike|dip\n1|2|3|4",
            StationSpec { north: Some(NorthReference::Magnetic), ..auto.clone() },
            "declination-missing",
            "declination",
        ),
        (
            "x|y|strike|dip\n1|2|3|4",
            StationSpec {
                north: Some(NorthReference::Magnetic),
                declination: Some(DeclinationSpec::Model),
                ..auto.clone()
            },
            "date-missing",
            "date",
        ),
    ] {
        let e = fails(text, &spec);
        assert_eq!(e.fault.code(), code, "{text}: {e}");
        assert!(e.to_string().starts_with("stations.csv: ") && e.to_string().contains(words), "{e}");
        assert!(e.hint().is_some(), "{e}");
    }
    let mut unread = auto.clone();
    unread.columns.date = Some("day".into());
    assert_eq!(fails("x|y|strike|dip\n1|2|3|4", &unread).fault.code(), "no-such-column");
    let mut wrong = auto.clone();
    wrong.columns.dip = Some("dipp".into());
    let e = fails("x|y|strike|dip\n1|2|3|4", &wrong);
    assert_eq!(e.hint().unwrap(), "did you mean \"dip\"?");
    let e = fails("lon|lat|strike|dip\n15.1|47.2|3|4", &StationSpec { crs: None, ..auto.clone() });
    assert!(e.hint().unwrap().contains("EPSG:4326"));
    let e = fails("lon|lat|strike|dip\n430000|5210000|3|4", &StationSpec { crs: None, ..auto });
    assert!(!e.hint().unwrap().contains("EPSG:4326"));
}

#[test]
fn shapes_beat_columns_and_the_users_crs_beats_the_sources() {
    let mut table = csv("x|y|strike|dip\n1|2|45|45\n1|2|45|45");
    table.shapes =
        Shapes::Points(vec![geo_types::Coord { x: 7.0, y: 8.0 }, geo_types::Coord { x: f64::NAN, y: f64::NAN }]);
    table.crs = Some("EPSG:28353".into());
    let out = readings(&table, &bedding(Notation::Auto)).unwrap();
    assert_eq!(out.measurements.position, [geo_types::Coord { x: 7.0, y: 8.0 }]);
    assert_eq!((out.measurements.crs.as_str(), codes(&out)), ("EPSG:32633", vec![(3, "position-missing")]));
    assert!(told(&out, "crs-overridden").unwrap().contains("EPSG:28353"));
    let own = readings(&table, &StationSpec { crs: None, ..bedding(Notation::Auto) }).unwrap();
    assert_eq!(own.measurements.crs, "EPSG:28353");
    table.crs = Some("EPSG:4326".into());
    table.shapes = Shapes::Points(vec![geo_types::Coord { x: 7.0, y: 91.0 }, geo_types::Coord { x: 7.0, y: 46.0 }]);
    let degrees = readings(&table, &StationSpec { crs: None, ..bedding(Notation::Auto) }).unwrap();
    assert_eq!(codes(&degrees), [(2, "position-swapped")]);
    // Both kinds of columns side by side: the CRS tells which pair is meant.
    let text = "easting|northing|lon|lat|strike|dip\n430000|5210000|15|47|45|45";
    assert_eq!(read(text, &bedding(Notation::Auto)).measurements.position[0].x, 430_000.0);
    let degrees = StationSpec { crs: Some("EPSG:4326".into()), ..bedding(Notation::Auto) };
    assert_eq!(read(text, &degrees).measurements.position[0].x, 15.0);
}

#[test]
fn planes_and_lines_share_columns_and_the_structure_decides() {
    let out = read(
        "x|y|type|azimuth|dip\n1|2|bedding|135|45\n1|2|fold axis|200|20\n1|2|lin||90",
        &StationSpec { notation: Notation::DipDirection, ..spec() },
    );
    assert_eq!(angles(&out), [(45.0, 45.0), (200.0, 20.0), (0.0, 90.0)]);
    let kinds: Vec<_> = out.measurements.structures.iter().map(|s| (s.name.as_str(), s.kind)).collect();
    assert_eq!(kinds, [("bedding", Kind::Planar), ("fold_axis", Kind::Linear), ("lineation", Kind::Linear)]);
    let own = read(
        "x|y|type|strike|dip|trend|plunge\n1|2|bedding|45|45||\n1|2|lineation|||200|20\n1|2|crack|10|20||\n1|2|groove|||30|40\n1|2|both|10|20|30|40",
        &spec(),
    );
    assert_eq!(angles(&own), [(45.0, 45.0), (200.0, 20.0), (10.0, 20.0), (30.0, 40.0)]);
    assert_eq!(codes(&own), [(6, "structure-kind-unknown")]);
    let kind = |i: usize| own.measurements.structures[own.measurements.structure[i] as usize].kind;
    assert_eq!((kind(2), kind(3)), (Kind::Planar, Kind::Linear));
    let rake = read(
        "x|y|type|strike|dip|rake\n1|2|slickenline|0|60|90\n1|2|slickenline|0|60|90 N\n1|2|fault|0|60|30",
        &spec(),
    );
    assert_eq!(angles(&rake).len(), 3);
    assert!((angles(&rake)[0].0 - 90.0).abs() < 1e-9 && (angles(&rake)[0].1 - 60.0).abs() < 1e-9);
    assert!(told(&rake, "rake-unused").is_some());
}

#[test]
fn a_kind_is_taken_from_columns_only_where_they_leave_no_doubt() {
    let columns = |header: &str, other: &str| {
        let out = read(&format!("x|y|type|{header}\n1|2|crack|30|20\n1|2|{other}|30|20"), &spec());
        let kind = out.measurements.structures.iter().find(|s| s.name == "crack").map(|s| s.kind);
        (kind, told(&out, "structure-kind-assumed").is_some())
    };
    assert_eq!(columns("strike|dip", "bedding"), (Some(Kind::Planar), true));
    assert_eq!(columns("trend|plunge", "lineation"), (Some(Kind::Linear), true));
    assert_eq!(columns("strike|dip", "lineation"), (None, false));
    assert_eq!(columns("azimuth|dip", "bedding"), (None, false));
    assert_eq!(columns("dip_direction|dip", "bedding"), (None, false));
}

#[test]
fn structures_are_mapped_by_the_user_first() {
    let mut s = spec();
    s.structures.insert("J".into(), "joint".into());
    s.structures.insert("strata".into(), "foliation".into());
    s.structures.insert("m".into(), "mullion".into());
    s.kinds.insert("mullion".into(), Kind::Linear);
    let out = read(
        "x|y|type|azimuth|dip\n1|2|j|45|45\n1|2|Strata|45|45\n1|2|M|200|20\n1|2|S1|45|45\n1|2|Axial Plane|45|45\n1|2|inverted bedding|45|45\n1|2|xyz|1|2",
        &s,
    );
    let names: Vec<_> =
        out.measurements.structure.iter().map(|&i| out.measurements.structures[i as usize].name.as_str()).collect();
    assert_eq!(names, ["joint", "foliation", "mullion", "S1", "axial_plane", "bedding"]);
    assert_eq!(out.measurements.polarity[5], Polarity::Overturned);
    assert_eq!(codes(&out), [(8, "structure-kind-unknown")]);
    assert!(out.refusals[0].reason.contains("[structures]"));
    assert_eq!(out.notices.iter().filter(|n| n.code == "structure-guessed").count(), 2);
}

#[test]
fn polarity_is_read_where_it_is_plain() {
    let out = read(
        "x|y|strike|dip|polarity\n1|2|45|45|upright\n1|2|45|45|OT\n1|2|45|45|\n1|2|45|45|1\n1|2|45|45|U",
        &bedding(Notation::RightHand),
    );
    use Polarity::*;
    assert_eq!(out.measurements.polarity, [Upright, Overturned, Unknown, Unknown, Unknown]);
    assert!(told(&out, "polarity-unclear").unwrap().starts_with("2 rows"));
    let out = read("x|y|strike|dip|polarity\n1|2|45|45|U\n1|2|45|45|O", &bedding(Notation::RightHand));
    assert_eq!(out.measurements.polarity, [Upright, Overturned]);
    let out = read("x|y|strike|dip|overturned\n1|2|45|45|yes\n1|2|45|45|0", &bedding(Notation::RightHand));
    assert_eq!(out.measurements.polarity, [Overturned, Upright]);
}

#[test]
fn lines_with_a_sense_may_point_up() {
    let mut s = spec();
    s.directed.insert("slickenline".into());
    let out = read("x|y|type|trend|plunge\n1|2|slickenline|20|30\n1|2|slickenline|20|-30\n1|2|lineation|20|-30", &s);
    assert_eq!(angles(&out), [(20.0, 30.0), (200.0, 30.0)]);
    assert_eq!(out.measurements.polarity, [Polarity::Upright, Polarity::Overturned]);
    assert_eq!(codes(&out), [(4, "plunge-negative")]);
}

#[test]
fn magnetic_sources_carry_declination_or_date() {
    let magnetic = |declination| StationSpec {
        north: Some(NorthReference::Magnetic),
        declination,
        ..bedding(Notation::RightHand)
    };
    let text = "x|y|strike|dip|magdec|date\n1|2|45|45|1.5|2024-07-02\n1|3|45|45|200|2.7.2024\n1|4|45|45||yesterday";
    let out = read(text, &magnetic(Some(DeclinationSpec::Constant(1.25))));
    assert_eq!(out.measurements.north, North::Magnetic(Declination::Constant(1.25)));
    assert!(out.measurements.declination.is_empty() && out.measurements.year.is_empty());
    let out = read(text, &magnetic(None));
    assert_eq!(out.measurements.declination, [1.5]);
    assert_eq!(codes(&out), [(3, "declination-out-of-range"), (4, "declination-missing")]);
    let out = read(text, &magnetic(Some(DeclinationSpec::Model)));
    assert_eq!(out.measurements.year, [2024.5, 2024.5]);
    assert_eq!(codes(&out), [(4, "date-unreadable")]);
    let slashes = |first: &str| {
        read(
            &format!("x|y|strike|dip|date\n1|2|45|45|{first}\n1|3|45|45|2/7/2024"),
            &magnetic(Some(DeclinationSpec::Model)),
        )
    };
    assert_eq!(slashes("13/7/2024").measurements.year[1], 2024.5);
    assert_eq!(codes(&slashes("3/7/2024")), [(2, "date-ambiguous"), (3, "date-ambiguous")]);
    assert!(readings(&csv(text), &magnetic(Some(DeclinationSpec::Constant(f64::NAN)))).is_err());
}

#[test]
fn duplicates_are_kept_and_reported_once() {
    let out = read(
        "id|x|y|strike|dip\na|1|2|45|45\nb|1|2|45|45\na|1|2|45|46\na|1|2|45|45\na|1|2|45|45",
        &bedding(Notation::RightHand),
    );
    assert_eq!(out.measurements.measured.len(), 5);
    let said = told(&out, "duplicate-rows").unwrap();
    assert!(said.starts_with("2 rows") && said.contains("row 5 as row 2"), "{said}");
}

#[test]
fn numbers_come_as_text_with_commas_too() {
    let mut table = csv("x|y|strike|dip\n430000,5|5210000,25|45,5|30,25");
    table.decimal_comma = true;
    let out = readings(&table, &bedding(Notation::RightHand)).unwrap();
    assert_eq!(angles(&out), [(45.5, 30.25)]);
    assert_eq!(out.measurements.position[0], geo_types::Coord { x: 430_000.5, y: 5_210_000.25 });
    table.decimal_comma = false;
    assert_eq!(codes(&readings(&table, &bedding(Notation::RightHand)).unwrap()), [(2, "not-a-number")]);
}

#[test]
fn the_order_of_rows_and_the_threads_change_nothing() {
    let rows = 70_000;
    let make = || {
        let mut t = Table::new("big")
            .with("x", "", "", (0..rows).map(|i| Some(f64::from(i))).collect::<Column>())
            .with("y", "", "", (0..rows).map(|i| Some(f64::from(i % 7))).collect::<Column>())
            .with("strike", "", "", (0..rows).map(|i| Some(i64::from(i % 400))).collect::<Column>())
            .with("dip", "", "", (0..rows).map(|i| Some(i64::from(i % 97) - 3)).collect::<Column>());
        t.rows = (0..rows as u64).map(|i| i + 2).collect();
        t
    };
    let run = |threads| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| readings(&make(), &bedding(Notation::RightHand)).unwrap())
    };
    let (one, four) = (run(1), run(4));
    assert_eq!(one, four);
    assert_eq!(one.measurements.measured.len() + one.refusals.len(), rows as usize);
    assert!(one.measurements.source_row.is_sorted() && one.refusals.is_sorted_by_key(|r| r.row));
}

proptest! {
    #[test]
    fn no_table_panics(
        cells in prop::collection::vec(prop_oneof!["[NSEW0-9 .,/>-]{0,8}", any::<String>()], 12..60),
        notation in 0usize..6,
        names in prop::sample::subsequence(
            vec!["x", "y", "strike", "dip", "trend", "plunge", "type", "dipdir", "quadrant", "rake", "polarity", "attitude", "date"], 4..10),
    ) {
        let mut table = Table::new("any");
        let rows = cells.len() / names.len();
        for (i, name) in names.iter().enumerate() {
            let column = cells[i * rows..(i + 1) * rows].iter().map(|c| Some(c.as_str())).collect::<Column>();
            table = table.with(name, "", "", column);
        }
        for spec in [bedding(Notation::ALL[notation]), spec()] {
            let spec = StationSpec { north: Some(NorthReference::Magnetic), declination: Some(DeclinationSpec::Model), date: Some("2024-01-01".into()), ..spec };
            if let Ok(out) = readings(&table, &spec) {
                prop_assert_eq!(out.measurements.measured.len() + out.refusals.len(), table.len());
            }
        }
    }
}
