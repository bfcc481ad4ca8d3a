//! How people name their columns.

use super::value::normal;

/// What a column can mean.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Meaning {
    Id,
    Z,
    Date,
    Structure,
    Azimuth,
    Strike,
    DipDirection,
    Trend,
    Dip,
    Plunge,
    DipQuadrant,
    Attitude,
    Rake,
    Polarity,
    Weight,
    Declination,
}

/// Likeness of two names that may be one misspelt.
pub(super) const NEAR_ENOUGH: f64 = 0.85;

impl Meaning {
    /// Key under `[stations.columns]`.
    pub fn key(self) -> &'static str {
        match self {
            Self::Id => "id",
            Self::Z => "z",
            Self::Date => "date",
            Self::Structure => "structure",
            Self::Azimuth => "azimuth",
            Self::Strike => "strike",
            Self::DipDirection => "dip_direction",
            Self::Trend => "trend",
            Self::Dip => "dip",
            Self::Plunge => "plunge",
            Self::DipQuadrant => "dip_quadrant",
            Self::Attitude => "attitude",
            Self::Rake => "rake",
            Self::Polarity => "polarity",
            Self::Weight => "weight",
            Self::Declination => "declination",
        }
    }
    /// The key an area file has for it: azimuth and dip serve planes and lines alike.
    pub fn area_key(self) -> &'static str {
        match self {
            Self::Strike | Self::DipDirection | Self::Trend => "azimuth",
            Self::Plunge => "dip",
            other => other.key(),
        }
    }
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Self::Id => "station id",
            Self::Z => "height",
            Self::DipDirection => "dip direction",
            Self::DipQuadrant => "dip quadrant",
            Self::Attitude => "whole attitude",
            other => other.key(),
        }
    }
    /// Spellings, in normal form, best first; those of one group are equally good.
    fn spellings(self) -> &'static [&'static [&'static str]] {
        match self {
            Self::Id => &[
                &["stationid", "station", "stationno", "stationnumber", "stationname", "stn", "stnid", "stnno"],
                &["site", "siteid", "siteno", "locality", "localityid", "waypoint", "wpt", "outcrop", "outcropid"],
                &["id", "pointid", "point", "obsid", "aufschluss", "punkt", "estacion"],
                &["name", "label", "sample", "no", "nr", "num"],
            ],
            Self::Z => &[&["z", "elevation", "elev", "altitude", "alt", "height", "hoehe", "altitud", "quota"]],
            Self::Date => &[
                &["date", "obsdate", "dateobs", "surveydate", "measdate", "datecollected", "fecha"],
                &["datetime", "timestamp", "time"],
            ],
            Self::Structure => &[
                &[
                    "structure",
                    "structuretype",
                    "structtype",
                    "struct",
                    "rockstruct",
                    "rockstructure",
                    "struktur",
                    "estructura",
                    "struttura",
                ],
                &["featuretype", "feattype", "feature"],
                &["featurecode", "featcode"],
                &["measurementtype", "meastype", "observationtype", "obstype", "planetype", "fabric", "gefuege"],
                &["type", "kind", "typ", "tipo", "code"],
            ],
            Self::Azimuth => {
                &[&["azimuth", "azimut", "azi", "az", "azm", "acimut"], &["direction", "dir", "bearing", "direccion"]]
            }
            Self::Strike => &[
                &[
                    "strike",
                    "strikerhr",
                    "strikelhr",
                    "rhrstrike",
                    "lhrstrike",
                    "strikerighthand",
                    "strikelefthand",
                    "strikeazimuth",
                    "strikeaz",
                    "streichen",
                ],
                &["str", "strk", "strikedir", "strikedirection", "rumbo", "direzione"],
            ],
            Self::DipDirection => &[
                &[
                    "dipdirection",
                    "dipdir",
                    "dipdirectn",
                    "dipazimuth",
                    "dipaz",
                    "dipazi",
                    "dipazm",
                    "downdipazimuth",
                    "fallrichtung",
                    "einfallrichtung",
                    "einfallsrichtung",
                    "immersione",
                    "directionpendage",
                    "direccionbuzamiento",
                ],
                &["dd", "ddir", "dipd", "dirpend", "dirbuz", "buzdir"],
            ],
            Self::Trend => &[
                &["trend", "plungeazimuth", "plungedirection", "plungedir", "plungeaz", "lineationtrend"],
                &["trd", "trnd"],
            ],
            Self::Dip => &[
                &["dip", "dipangle", "dipamount", "truedip"],
                &[
                    "dipang",
                    "pendage",
                    "buzamiento",
                    "buz",
                    "fallen",
                    "einfallen",
                    "fallwinkel",
                    "einfallwinkel",
                    "mergulho",
                ],
                &["inclination", "incl", "inclinazione", "inclinaison"],
                &["dp"],
            ],
            Self::Plunge => {
                &[&["plunge", "plungeangle", "lineationplunge"], &["plg", "plng", "plongement", "abtauchen"]]
            }
            Self::DipQuadrant => &[&["dipquadrant", "dipquad", "dipside", "dipletter"], &["quadrant", "quad"]],
            Self::Attitude => &[&["attitude", "attitudes"], &["orientation", "reading", "measurement", "strikedip"]],
            Self::Rake => &[&["rake"], &["pitch"]],
            Self::Polarity => &[
                &["polarity", "younging", "facing", "wayup", "polaritaet", "polarite", "polaridad", "polarita"],
                &["overturned", "inverted"],
            ],
            Self::Weight => &[&["weight", "gewicht", "poids", "peso"], &["wt", "wgt"]],
            Self::Declination => {
                &[&["declination", "magneticdeclination", "magdeclination", "magdec", "magdecl"], &["decl"]]
            }
        }
    }
    /// True where a name is not one of the spellings, but close to one or holding one.
    pub fn near(self, column: &str) -> bool {
        let name = normal(column);
        self.spellings()
            .iter()
            .flat_map(|group| group.iter())
            .any(|s| s.len() >= 3 && name.contains(s) || s.len() >= 4 && strsim::jaro_winkler(&name, s) >= NEAR_ENOUGH)
    }
    /// Where the name of a column can mean this: how good it is, 0 the best.
    pub fn rank(self, column: &str) -> Option<usize> {
        let name = normal(column);
        // Surveys append the name of their coding scheme.
        if self == Self::Structure && (name.starts_with("featdesc") || name.starts_with("featuredesc")) {
            return Some(1);
        }
        self.spellings().iter().position(|group| group.iter().any(|s| fits(column, &name, s)))
    }
}

/// A unit may follow the name (`dip_deg`). Shapefiles cut names at ten characters, so a name of ten may be the start of
/// a longer spelling.
fn fits(column: &str, name: &str, spelling: &str) -> bool {
    let bare = name.strip_suffix("degrees").or_else(|| name.strip_suffix("deg"));
    name == spelling
        || bare == Some(spelling)
        || column.chars().count() == 10 && name.len() >= 8 && spelling.starts_with(name)
}

/// Names for the two halves of a position; true where they are longitude and latitude.
pub(super) const PAIRS: [(&str, &str, bool); 22] = [
    ("easting", "northing", false),
    ("eastings", "northings", false),
    ("east", "north", false),
    ("utme", "utmn", false),
    ("utmeasting", "utmnorthing", false),
    ("utmx", "utmy", false),
    ("xutm", "yutm", false),
    ("x", "y", false),
    ("xcoord", "ycoord", false),
    ("coordx", "coordy", false),
    ("xcoordinate", "ycoordinate", false),
    ("pointx", "pointy", false),
    ("xm", "ym", false),
    ("rechtswert", "hochwert", false),
    ("este", "norte", false),
    ("e", "n", false),
    ("longitude", "latitude", true),
    ("lon", "lat", true),
    ("long", "lat", true),
    ("lng", "lat", true),
    ("longitud", "latitud", true),
    ("laenge", "breite", true),
];

/// True where a name can be this half of a pair.
pub(super) fn half(column: &str, spelling: &str) -> bool {
    fits(column, &normal(column), spelling)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_known_by_case_punctuation_and_cut() {
        for (column, meaning, rank) in [
            ("DipDirecti", Meaning::DipDirection, Some(0)),
            ("dip_direct", Meaning::DipDirection, Some(0)),
            ("Dip Direction", Meaning::DipDirection, Some(0)),
            ("DIP-DIR.", Meaning::DipDirection, Some(0)),
            ("DipDirectn", Meaning::DipDirection, Some(0)),
            ("Dip", Meaning::Dip, Some(0)),
            ("DipEstimat", Meaning::Dip, None),
            ("DipEstimat", Meaning::DipDirection, None),
            ("FeatureCod", Meaning::Structure, Some(2)),
            ("FeatDescGA", Meaning::Structure, Some(1)),
            ("FeatureC_1", Meaning::Structure, None),
            ("ObsType", Meaning::Structure, Some(3)),
            ("Streichen", Meaning::Strike, Some(0)),
            ("Buzamiento", Meaning::Dip, Some(1)),
            ("STATION_ID", Meaning::Id, Some(0)),
            ("ROCK_STRUCT", Meaning::Structure, Some(0)),
            ("STRUCT_TYPE", Meaning::Structure, Some(0)),
            ("Strk", Meaning::Strike, Some(1)),
            ("DIP_DIR", Meaning::DipDirection, Some(0)),
            ("dp", Meaning::Dip, Some(3)),
        ] {
            assert_eq!(meaning.rank(column), rank, "{column}");
        }
        assert!(Meaning::Dip.near("my_dip_1") && Meaning::Strike.near("strik") && !Meaning::Dip.near("colour"));
    }
}
