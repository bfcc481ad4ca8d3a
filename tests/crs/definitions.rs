//! What a CRS definition is understood as.

use homocline::crs::{CrsError, MapCrs};

fn epsg(definition: &str) -> Option<String> {
    let crs = MapCrs::parse(definition).unwrap();
    crs.authority().map(|(authority, code)| format!("{authority}:{code}"))
}

#[test]
fn one_crs_in_many_spellings() {
    let wkt = MapCrs::parse("EPSG:32630").unwrap().wkt().to_owned();
    for definition in ["EPSG:32630", "epsg:32630", "32630", " 32630\n", "urn:ogc:def:crs:EPSG::32630", &wkt] {
        let crs = MapCrs::parse(definition).unwrap();
        assert_eq!(crs.authority(), Some(("EPSG", "32630")), "{definition}");
        assert_eq!(crs.code_or_wkt(), "EPSG:32630");
        assert_eq!(crs.name(), "WGS 84 / UTM zone 30N");
        assert_eq!(crs.base_name(), "WGS 84");
        assert!(crs.is_projected() && crs.is_conformal() && !crs.points_west_and_south());
        assert_eq!(crs.unit_in_metres(), Some(1.0));
        let area = crs.area_of_use().unwrap();
        assert_eq!((area.west, area.south, area.east, area.north), (-6.0, 0.0, 0.0, 84.0));
    }
}

// ESRI's flavour of WKT, as it lies beside shapefiles: other names, no codes.
#[test]
fn the_text_beside_a_shapefile_is_recognised() {
    let utm = r#"PROJCS["WGS_1984_UTM_Zone_33N",GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",
        SPHEROID["WGS_1984",6378137.0,298.257223563]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],
        PROJECTION["Transverse_Mercator"],PARAMETER["False_Easting",500000.0],PARAMETER["False_Northing",0.0],
        PARAMETER["Central_Meridian",15.0],PARAMETER["Scale_Factor",0.9996],PARAMETER["Latitude_Of_Origin",0.0],
        UNIT["Meter",1.0]]"#;
    assert_eq!(epsg(utm).as_deref(), Some("EPSG:32633"));
    let geographic = r#"GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",SPHEROID["WGS_1984",6378137.0,298.257223563]],
        PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]]"#;
    assert_eq!(epsg(geographic).as_deref(), Some("EPSG:4326"));
}

// A code that a text claims but whose parameters differ (here the false easting) is not believed.
#[test]
fn a_false_claim_to_a_code_is_not_believed() {
    let wkt = MapCrs::parse("EPSG:32630").unwrap().wkt().replace("500000", "400000");
    assert_eq!(epsg(&wkt), None);
    assert!(MapCrs::parse(&wkt).unwrap().code_or_wkt().starts_with("PROJCRS"));
}

#[test]
fn definitions_without_a_code_work() {
    let crs = MapCrs::parse("+proj=lcc +lat_1=10 +lat_2=20 +lat_0=15 +lon_0=33 +ellps=GRS80 +units=us-ft").unwrap();
    assert_eq!(crs.authority(), None);
    assert!(crs.is_conformal() && crs.area_of_use().is_none());
    // The US survey foot is 1200/3937 m (NIST Handbook 44, appendix C).
    assert!((crs.unit_in_metres().unwrap() - 1200.0 / 3937.0).abs() < 1e-12);
    assert!(MapCrs::parse(crs.code_or_wkt()).unwrap() == crs);
    let utm = MapCrs::parse("+proj=utm +zone=30 +datum=WGS84 +units=m +no_defs").unwrap();
    assert_eq!(utm.authority(), Some(("EPSG", "32630")));
    assert_eq!(utm.area_of_use().unwrap().east, 0.0);
    // A PROJ string with its own shift to WGS 84 keeps it.
    let shifted = "+proj=tmerc +lat_0=0 +lon_0=9 +k=1 +x_0=3500000 +ellps=bessel +towgs84=598.1,73.7,418.2,0.202,0.045,-2.455,6.7";
    assert!(MapCrs::parse(shifted).unwrap().wkt().starts_with("BOUNDCRS"));
}

// IGN's base of the old French Lambert grids: Paris (2 deg 20' 14.025" E, EPSG) and grads.
#[test]
fn prime_meridians_and_grads() {
    let crs = MapCrs::parse("EPSG:27572").unwrap();
    assert!((crs.base_unit_in_degrees() - 0.9).abs() < 1e-12);
    let north = crs.local_north(geo_types::Coord { x: 600_000.0, y: 2_200_000.0 }).unwrap();
    let paris = 2.0 + 20.0 / 60.0 + 14.025 / 3600.0;
    assert!((north.longitude_latitude().x - paris).abs() < 1e-6, "{north:?}");
    assert!(north.convergence().abs() < 1e-6);
    assert!(crs.area_of_use().unwrap().contains(north.longitude_latitude()));
}

#[test]
fn of_a_compound_crs_the_horizontal_part_is_taken() {
    // British National Grid + ODN height.
    assert_eq!(epsg("EPSG:7405").as_deref(), Some("EPSG:27700"));
}

#[test]
fn south_and_west_axes_are_noticed() {
    let crs = MapCrs::parse("EPSG:2053").unwrap();
    assert!(crs.points_west_and_south());
    for upright in ["EPSG:32661", "EPSG:3031", "EPSG:3413", "EPSG:2193", "EPSG:31467"] {
        assert!(!MapCrs::parse(upright).unwrap().points_west_and_south(), "{upright}");
    }
}

#[test]
fn what_cannot_carry_a_map_is_refused_with_advice() {
    assert_eq!(MapCrs::parse("  ").unwrap_err(), CrsError::Missing);
    for unknown in ["EPSG:999999", "no such thing", "+proj=nonsense", "EPSG:32630\0", "{}", "PROJCS[\"x\"", "-1"] {
        let error = MapCrs::parse(unknown).unwrap_err();
        assert!(matches!(error, CrsError::Unknown { .. }), "{unknown}: {error}");
        assert!(error.hint().unwrap().contains("EPSG:32630"));
    }
    let local = r#"LOCAL_CS["mine grid",LOCAL_DATUM["shaft",0],UNIT["metre",1],AXIS["X",EAST],AXIS["Y",NORTH]]"#;
    for (definition, word) in [
        ("EPSG:5773", "vertical"),
        ("EPSG:4978", "geocentric"),
        (local, "engineering"),
        ("+proj=pipeline +step +proj=utm +zone=30", "not a CRS"),
    ] {
        let error = MapCrs::parse(definition).unwrap_err();
        assert!(error.to_string().contains(word), "{definition}: {error}");
        assert!(error.hint().is_some());
    }
    // A long text is not thrown back whole.
    assert!(MapCrs::parse(&"x".repeat(5000)).unwrap_err().to_string().len() < 400);
}
