//! Ways of writing attitudes, as a table of cases. Where no source stands beside a case it is common practice of the
//! trade, no source; the arithmetic (dip direction = strike + 90) is the right-hand rule itself.

use homocline::orientation::notation::{
    Notation, NotationError, Order, Printed, Reading, Wanted, agree, attitude, azimuth, azimuth_cell, dip_cell,
    point_cell, polarity, shown, written_as,
};
use homocline::orientation::notation::{Quantity, rake_cell};
use homocline::orientation::{Bearing, Dip, Measured, Polarity};
use proptest::prelude::*;

fn pair(reading: Result<Reading, NotationError>) -> Result<(f64, f64), &'static str> {
    match reading {
        Ok(Reading { measured: Measured::Plane { strike: Some(a), dip: d }, .. })
        | Ok(Reading { measured: Measured::Line { trend: a, plunge: d }, .. }) => Ok((a.degrees(), d.degrees())),
        Ok(Reading { measured: Measured::Plane { strike: None, dip }, .. }) => Ok((-1.0, dip.degrees())),
        Err(e) => Err(e.code()),
    }
}

fn plane(text: &str, notation: Notation) -> Result<(f64, f64), &'static str> {
    pair(attitude(text, Wanted::Plane, notation, Order::Unknown))
}

fn line(text: &str) -> Result<(f64, f64), &'static str> {
    pair(attitude(text, Wanted::Line, Notation::Auto, Order::Unknown))
}

fn close(got: Result<(f64, f64), &'static str>, want: (f64, f64)) -> bool {
    got.is_ok_and(|g| (g.0 - want.0).abs() < 1e-9 && (g.1 - want.1).abs() < 1e-9)
}

#[test]
fn one_plane_in_many_hands() {
    for text in [
        "045/45",
        "045 / 45",
        "045 45",
        "045, 45",
        "045;45",
        "045,45",
        "045|45",
        "045°/45°",
        "045º / 45º",
        "045˚ 45˚",
        "045-45",
        "045–45",
        "045/45 SE",
        "045/45SE",
        "045/45/SE",
        "045/45 se.",
        "225/45 SE",
        "225/45 south-east",
        "225/45 South East",
        "045/45 E",
        "045/45 S",
        "N45E 45SE",
        "N45E/45SE",
        "N 45 E/45 SE",
        "n45e, 45 se",
        "N45°E 45°SE",
        "N45ºE, 45ºSE",
        "N 45° E / 45° SE",
        "S45W 45SE",
        "NE 45 SE",
        "NE-SW 45 SE",
        "45SE/N45E",
        "135->45",
        "135 -> 45",
        "135→45",
        "135=>45",
        "135-->45",
        "135°→45°",
        "45->135",
        "045\u{a0}/\u{a0}45",
        "０４５／４５",
        "045°00'/45°00'",
        "045°00′00″/45°",
        "45d00m/45",
        "045 00/45 00",
        "045.0/45,0",
        "045,0 45,0",
        "405/45",
    ] {
        assert_eq!(plane(text, Notation::Auto), Ok((45.0, 45.0)), "{text}");
    }
    assert_eq!(plane("225/45", Notation::LeftHand), Ok((45.0, 45.0)));
    assert_eq!(plane("135/45", Notation::DipDirection), Ok((45.0, 45.0)));
    assert_eq!(plane("S45E 45", Notation::DipDirection), Ok((45.0, 45.0)));
    assert_eq!(plane("S45E/45SE", Notation::DipDirection), Ok((45.0, 45.0)));
    assert_eq!(plane("045/45", Notation::Quadrant), Err("dip-quadrant-missing"));
    assert_eq!(plane("N45E 45", Notation::RightHand), Ok((45.0, 45.0)));
}

/// A hint must not promise what would be refused as well.
#[test]
fn contradictions_say_what_would_help() {
    let hint = |text: &str, notation| attitude(text, Wanted::Plane, notation, Order::Unknown).unwrap_err().hint();
    let names_quadrant = |text: &str, notation| hint(text, notation).unwrap().contains("\"quadrant\"");
    assert!(names_quadrant("045/45 NW", Notation::RightHand));
    assert!(!names_quadrant("N45W 60NW", Notation::RightHand));
    assert!(!names_quadrant("N45E 45NE", Notation::Auto));
    let dip = Dip::new(40.0).unwrap();
    let both = |notation, direction| agree(notation, 45.0, direction, dip).unwrap_err();
    let plain = both(Notation::Quadrant, 60.0);
    assert_eq!(plain.to_string(), "strike 45 and dip direction 60 contradict each other");
    assert!(plain.hint().unwrap().contains("90 degrees apart"));
    let wrong = both(Notation::RightHand, 315.0);
    assert!(wrong.to_string().ends_with("(the strike read as right-hand)"), "{wrong}");
    assert!(wrong.hint().unwrap().contains("left-hand"));
}

#[test]
fn values_stand_in_messages_as_people_write_them() {
    let of = |text: &str| dip_cell(Quantity::Dip, text).unwrap_err().to_string();
    assert_eq!(of("weird thing, \"q\""), r#""weird thing, \"q\"" is not a dip in degrees"#);
    let far = azimuth(Quantity::Strike, 1e300).unwrap_err().to_string();
    assert!(far.starts_with("strike 1e300 is not an azimuth"), "{far}");
    assert_eq!((shown(-0.0), shown(45.5), shown(0.0001)), ("0".into(), "45.5".into(), "0.0001".into()));
}

#[test]
fn bearings_and_their_dips() {
    for (text, want) in [
        ("N70°W 30°NE", (290.0, 30.0)),
        ("N70W/30SW", (110.0, 30.0)),
        ("S20W 60 NW", (200.0, 60.0)),
        ("S20W 60 SE", (20.0, 60.0)),
        ("E-W 20 S", (90.0, 20.0)),
        ("E-W 20N", (270.0, 20.0)),
        ("W–E/20N", (270.0, 20.0)),
        ("N-S 35 W", (180.0, 35.0)),
        ("EW 30N", (270.0, 30.0)),
        ("we 20 S", (90.0, 20.0)),
        ("NS 30E", (0.0, 30.0)),
        ("SN/30W", (180.0, 30.0)),
        ("due N 35 E", (0.0, 35.0)),
        ("due N, 35 W", (180.0, 35.0)),
        ("N, 35 E", (0.0, 35.0)),
        ("N0E 35 E", (0.0, 35.0)),
        ("N90E 35 S", (90.0, 35.0)),
        ("E20N 35 SE", (70.0, 35.0)),
        ("N45°30'E 30°15'SE", (45.5, 30.25)),
        ("N 45 30 E / 30 15 SE", (45.5, 30.25)),
        ("045°30'/30", (45.5, 30.0)),
        ("45d30m/30", (45.5, 30.0)),
        ("45d30m36s/30", (45.51, 30.0)),
        ("045°30’36”/30", (45.51, 30.0)),
        ("045 deg / 30 deg", (45.0, 30.0)),
        ("225,5/30,25", (225.5, 30.25)),
        ("225,5 30,25", (225.5, 30.25)),
        ("225,5,30,25", (225.5, 30.25)),
        ("225.5->30.25", (135.5, 30.25)),
    ] {
        assert!(close(plane(text, Notation::Auto), want), "{text}: {:?}", plane(text, Notation::Auto));
    }
}

#[test]
fn flat_and_upright_planes() {
    for (text, want) in [
        ("horizontal", (-1.0, 0.0)),
        ("/0", (-1.0, 0.0)),
        ("- / 0", (-1.0, 0.0)),
        ("000/00", (0.0, 0.0)),
        ("045/90", (45.0, 90.0)),
        ("045 vertical", (45.0, 90.0)),
        ("N45E vertical", (45.0, 90.0)),
        ("N45E 90", (45.0, 90.0)),
        ("N45E/90 NW", (225.0, 90.0)),
    ] {
        let got = plane(text, Notation::Auto);
        if text == "- / 0" {
            assert!(got.is_err(), "a dash is no number: {got:?}");
        } else {
            assert_eq!(got, Ok(want), "{text}");
        }
    }
    assert_eq!(plane("vertical", Notation::Auto), Err("azimuth-missing"));
    assert_eq!(plane("/30", Notation::Auto), Err("azimuth-missing"));
}

#[test]
fn lines_in_either_order_where_nothing_is_in_doubt() {
    for (text, want) in [
        ("225/30", (225.0, 30.0)),
        ("225->30", (225.0, 30.0)),
        ("30->225", (225.0, 30.0)),
        ("30/225", (225.0, 30.0)),
        ("30→045", (45.0, 30.0)),
        ("045→30", (45.0, 30.0)),
        ("45/30", (45.0, 30.0)),
        ("30 N45E", (45.0, 30.0)),
        ("30->N45E", (45.0, 30.0)),
        ("N45W/30", (315.0, 30.0)),
        ("S 30", (180.0, 30.0)),
        ("120/vertical", (120.0, 90.0)),
        ("vertical", (0.0, 90.0)),
    ] {
        assert_eq!(line(text), Ok(want), "{text}");
    }
    assert_eq!(line("45->30"), Err("order-ambiguous"));
    let told = |order| pair(attitude("45->30", Wanted::Line, Notation::Auto, order));
    assert_eq!(told(Order::AzimuthFirst), Ok((45.0, 30.0)));
    assert_eq!(told(Order::InclinationFirst), Ok((30.0, 45.0)));
    assert_eq!(written_as("225->30").order, Order::AzimuthFirst);
    assert_eq!(written_as("30->225").order, Order::InclinationFirst);
    assert_eq!(line("225/-30"), Err("plunge-negative"));
    let up = attitude("225/-30", Wanted::DirectedLine, Notation::Auto, Order::Unknown);
    assert_eq!(up.as_ref().unwrap().polarity, Some(Polarity::Overturned));
    assert_eq!(pair(up), Ok((45.0, 30.0)));
}

#[test]
fn rakes_in_text() {
    let trend = (30f64.to_radians().tan() * 0.5).atan().to_degrees();
    let plunge = (0.5 * 60f64.to_radians().sin()).asin().to_degrees();
    for (text, want) in [
        ("000/60 rake 30", (trend, plunge)),
        ("000/60 E rake 30 N", (trend, plunge)),
        ("180/60 E rake 30 N", (trend, plunge)),
        ("N0E 60E, rake 30 N", (trend, plunge)),
        ("N-S/60 E pitch 30 S", (180.0 - trend, plunge)),
        ("090->60 rake 150", (180.0 - trend, plunge)),
    ] {
        assert!(close(line(text), want), "{text}: {:?} {want:?}", line(text));
    }
    assert_eq!(line("000/60 rake 30 E"), Err("rake-end-contradicts"));
    assert_eq!(line("000/60 rake 181"), Err("rake-out-of-range"));
    assert_eq!(plane("000/60 rake 30", Notation::Auto), Ok((0.0, 60.0)));
}

#[test]
fn what_is_refused_says_why() {
    for (text, code) in [
        ("N45E 45NE", "dip-quadrant-contradicts"),
        ("045/45 SW", "dip-quadrant-contradicts"),
        ("N10E 30 N", "dip-quadrant-contradicts"),
        ("N45E 45", "dip-quadrant-missing"),
        ("N45E", "dip-missing"),
        ("045", "dip-missing"),
        ("045/-99", "missing-value-code"),
        ("-99/-99", "missing-value-code"),
        ("-999/30", "missing-value-code"),
        ("9999/30", "missing-value-code"),
        ("045/99", "missing-value-code"),
        ("045/120", "dip-out-of-range"),
        ("045/-10", "dip-out-of-range"),
        ("-45/30", "azimuth-negative"),
        ("725/30", "azimuth-out-of-range"),
        ("N95E 30 SE", "quadrant-bearing-unreadable"),
        ("N-E 30 SE", "quadrant-bearing-unreadable"),
        ("", "attitude-unreadable"),
        ("5-15", "attitude-unreadable"),
        ("045/45/30", "attitude-unreadable"),
        ("045°75'/30", "attitude-unreadable"),
        ("045/45 SO", "attitude-unreadable"),
        ("see notes", "attitude-unreadable"),
        ("NaN/30", "attitude-unreadable"),
        ("1e308/30", "attitude-unreadable"),
    ] {
        assert_eq!(plane(text, Notation::Auto), Err(code), "{text}");
    }
    let e = attitude("N45E 45NE", Wanted::Plane, Notation::Auto, Order::Unknown).unwrap_err();
    assert_eq!(e.to_string(), "strike 45 and dip quadrant NE contradict each other");
    assert!(e.hint().is_some());
    let e = attitude("045/120", Wanted::Plane, Notation::Auto, Order::Unknown).unwrap_err();
    assert!(e.hint().unwrap().contains("dip 60 and polarity overturned"));
    assert_eq!(plane("045/45 NW", Notation::RightHand), Err("dip-quadrant-contradicts"));
}

#[test]
fn polarity_beside_the_attitude() {
    for (text, want) in [
        ("045/45 SE overturned", Some(Polarity::Overturned)),
        ("N45E 45SE OT", Some(Polarity::Overturned)),
        ("upright 045/45", Some(Polarity::Upright)),
        ("045/45", None),
    ] {
        let got = attitude(text, Wanted::Plane, Notation::Auto, Order::Unknown).unwrap();
        assert_eq!(got.polarity, want, "{text}");
        assert_eq!(pair(Ok(got)), Ok((45.0, 45.0)));
    }
}

#[test]
fn single_cells() {
    for (text, want, letters) in [
        ("045", 45.0, false),
        (" 45,5 ", 45.5, false),
        ("45°30'", 45.5, false),
        ("45 30", 45.5, false),
        ("45 30 36", 45.51, false),
        ("45d30m", 45.5, false),
        ("−99", -99.0, false),
        ("-99", -99.0, false),
        ("1e308", 1e308, false),
        ("N45E", 45.0, true),
        ("N 45 30 W", 314.5, true),
        ("E-W", 90.0, true),
        ("due N", 0.0, true),
        ("SW", 225.0, true),
    ] {
        let got = azimuth_cell(Quantity::Strike, text).unwrap();
        assert!((got.degrees - want).abs() < 1e-9 && got.letters == letters, "{text}: {got:?}");
    }
    for (text, want, side) in
        [("45", 45.0, None), ("45SE", 45.0, Some("SE")), ("30° 15' nw", 30.25, Some("NW")), ("vertical", 90.0, None)]
    {
        let got = dip_cell(Quantity::Dip, text).unwrap();
        assert_eq!((got.degrees, got.side.map(|p| p.name)), (want, side), "{text}");
    }
    for (text, code) in
        [("NaN", "not-finite"), ("inf", "not-finite"), ("steep", "not-a-number"), ("5-15", "not-a-number")]
    {
        assert_eq!(dip_cell(Quantity::Dip, text).unwrap_err().code(), code, "{text}");
        assert_eq!(azimuth_cell(Quantity::Strike, text).unwrap_err().code(), code, "{text}");
    }
    assert_eq!(rake_cell("30 NE").unwrap().side.unwrap().name, "NE");
    assert_eq!(point_cell(" South-East ").unwrap().name, "SE");
    assert_eq!(point_cell("SO").unwrap_err().code(), "compass-point-unknown");
}

fn same(a: Measured, b: Measured) -> bool {
    let turn = |x: f64, y: f64| {
        let d = (x - y).rem_euclid(360.0);
        d.min(360.0 - d)
    };
    match (a, b) {
        (Measured::Plane { strike: None, .. }, Measured::Plane { strike: None, .. }) => true,
        (Measured::Plane { strike: Some(s), dip: d }, Measured::Plane { strike: Some(t), dip: e })
        | (Measured::Line { trend: s, plunge: d }, Measured::Line { trend: t, plunge: e }) => {
            turn(s.degrees(), t.degrees()) < 2e-9 && (d.degrees() - e.degrees()).abs() < 2e-9
        }
        _ => false,
    }
}

fn degrees(top: u32) -> impl Strategy<Value = f64> {
    prop_oneof![(0..=top).prop_map(f64::from), (0..=top * 10).prop_map(|t| f64::from(t) / 10.0), 0.0..f64::from(top)]
}

proptest! {
    #[test]
    fn planes_are_read_as_printed(strike in degrees(360), dip in degrees(90)) {
        let measured = Measured::Plane { strike: Some(Bearing::new(strike).unwrap()), dip: Dip::new(dip).unwrap() };
        for notation in [Notation::RightHand, Notation::LeftHand, Notation::DipDirection, Notation::Quadrant] {
            let text = Printed { measured, notation }.to_string();
            let back = attitude(&text, Wanted::Plane, notation, Order::Unknown);
            prop_assert!(back.as_ref().is_ok_and(|b| same(b.measured, measured)), "{} {:?} {:?}", text, measured, back);
            if notation != Notation::LeftHand {
                let back = attitude(&text, Wanted::Plane, Notation::Auto, Order::Unknown);
                prop_assert!(back.as_ref().is_ok_and(|b| same(b.measured, measured)), "auto {} {:?}", text, back);
            }
        }
    }

    #[test]
    fn lines_are_read_as_printed(trend in degrees(360), plunge in degrees(90)) {
        let measured = Measured::Line { trend: Bearing::new(trend).unwrap(), plunge: Dip::new(plunge).unwrap() };
        for notation in Notation::ALL {
            let text = Printed { measured, notation }.to_string();
            let back = attitude(&text, Wanted::Line, notation, Order::Unknown);
            prop_assert!(back.as_ref().is_ok_and(|b| same(b.measured, measured)), "{} {:?}", text, back);
        }
    }

    #[test]
    fn no_text_panics(text in prop_oneof![any::<String>(), "[NSEWnsew0-9 .,/>°'\"→–-]{0,24}"], i in 0usize..6) {
        for wanted in [Wanted::Plane, Wanted::Line, Wanted::DirectedLine] {
            if let Err(e) = attitude(&text, wanted, Notation::ALL[i], Order::Unknown) {
                prop_assert!(!e.code().is_empty() && !e.to_string().is_empty());
                e.hint();
            }
        }
        let _ = (azimuth_cell(Quantity::Azimuth, &text), dip_cell(Quantity::Dip, &text), point_cell(&text));
        let _ = (polarity(&text), written_as(&text));
    }
}
