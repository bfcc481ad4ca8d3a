//! A CRS as a map needs it: parsed once, then only asked.

use super::area::AreaOfUse;
use super::error::CrsError;
use super::ffi::{Object, ObjectKind};
use super::pool::{Pool, Recipe};
use std::sync::Arc;

/// A projected or geographic CRS. Coordinates are easting or longitude first, whatever its authority says.
#[derive(Debug, Clone)]
pub struct MapCrs {
    given: String,
    /// What PROJ is fed: an authority code where that means the same, else WKT.
    pub(super) definition: String,
    wkt: String,
    name: String,
    authority: Option<(String, String)>,
    area: Option<AreaOfUse>,
    base: Base,
    grid: Option<Grid>,
}

/// The geographic CRS underneath.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Base {
    pub name: String,
    /// Radians per unit of its longitudes and latitudes.
    pub unit: f64,
    /// Degrees of its prime meridian east of Greenwich.
    pub prime_meridian: f64,
    pub eccentricity_squared: f64,
}

/// What only a projected CRS has.
#[derive(Debug, Clone)]
pub(super) struct Grid {
    /// Metres per unit.
    unit: f64,
    reversed: bool,
    pub conformal: bool,
    /// From the base CRS to the grid.
    pub projection: Arc<Pool>,
}

/// EPSG codes of the conformal projection methods: on their maps every azimuth is turned by the
/// convergence alone (EPSG Guidance Note 7-2 describes each as conformal, or Snyder, PP 1395).
/// A conformal method that is missing here costs time, not accuracy: the general way gives the same.
const CONFORMAL_METHODS: [u32; 20] = [
    9801, 9802, 9803, 9826, 1051, // Lambert conic conformal
    9804, 9805, 1044, // Mercator, variants A, B, C (not the "web" Mercator, 1024)
    9807, 9808, // transverse Mercator
    9809, 9810, 9829, 9830, // oblique and polar stereographic
    9812, 9813, 9815, // oblique Mercator, Laborde
    9811, // New Zealand map grid
    9819, 1041, // Krovak
];

impl MapCrs {
    /// From an authority code ("EPSG:32630" or a bare "32630"), WKT of any flavour, PROJJSON, a PROJ string,
    /// or a name that PROJ knows. Of a compound CRS the horizontal part is taken.
    ///
    /// # Errors
    /// [`CrsError::Missing`], [`CrsError::Unknown`], or [`CrsError::Unsuited`] for vertical, geocentric and
    /// local engineering CRSs and for what is no CRS.
    pub fn parse(definition: &str) -> Result<Self, CrsError> {
        let given = definition.trim().trim_start_matches('\u{feff}');
        if given.is_empty() {
            return Err(CrsError::Missing);
        }
        let unknown = |reason: String| CrsError::Unknown { definition: shortened(given), reason };
        let whole = Object::new(&spelled_for_proj(given)).map_err(unknown)?;
        let crs = flat(whole).ok_or_else(|| unknown("it has no horizontal part".to_owned()))?;
        let inner = match crs.kind() {
            ObjectKind::Bound => crs.bound_source(),
            _ => None,
        };
        let plain = inner.as_ref().unwrap_or(&crs);
        let kind = plain.kind();
        if let Some(what) = unsuited(kind) {
            return Err(CrsError::Unsuited { definition: shortened(given), what });
        }

        let known = registered(plain);
        // A CRS that carries its own datum shift must keep it.
        let used = if inner.is_some() { &crs } else { known.as_ref().unwrap_or(&crs) };
        let described = known.as_ref().unwrap_or(plain);
        let authority = known.as_ref().and_then(Object::authority);
        let missing = |what: &str| unknown(format!("its {what} cannot be read"));
        let wkt = used.wkt().ok_or_else(|| missing("text"))?;
        let definition = match &authority {
            Some((authority, code)) if inner.is_none() => format!("{authority}:{code}"),
            _ => wkt.clone(),
        };
        let name = described.name().unwrap_or_else(|| shortened(given));
        let area = described.area_of_use().map(|([west, south, east, north], name)| AreaOfUse {
            name,
            west,
            south,
            east,
            north,
        });

        let base = described.base().ok_or_else(|| missing("base CRS"))?;
        let base = Base {
            name: base.name().unwrap_or_default(),
            unit: base.axes().ok_or_else(|| missing("axes"))?[0].unit,
            prime_meridian: base.prime_meridian().ok_or_else(|| missing("prime meridian"))?,
            eccentricity_squared: base.eccentricity_squared().ok_or_else(|| missing("ellipsoid"))?,
        };
        let grid = if kind == ObjectKind::Projected {
            let [first, second] = described.axes().ok_or_else(|| missing("axes"))?;
            let directions = [first.direction.as_str(), second.direction.as_str()];
            Some(Grid {
                unit: first.unit,
                reversed: directions.contains(&"west") && directions.contains(&"south"),
                conformal: described.method().is_some_and(|code| CONFORMAL_METHODS.contains(&code)),
                projection: Arc::new(Pool::new(Recipe::ProjectionOf(definition.clone())).map_err(unknown)?),
            })
        } else {
            None
        };
        Ok(Self { given: given.to_owned(), definition, wkt, name, authority, area, base, grid })
    }

    /// The definition as it was given.
    pub fn given(&self) -> &str {
        &self.given
    }
    /// The authority's or the definition's name for it.
    pub fn name(&self) -> &str {
        &self.name
    }
    /// Authority and code, where the definition is that of a registered CRS (EPSG, ESRI...).
    pub fn authority(&self) -> Option<(&str, &str)> {
        self.authority.as_ref().map(|(authority, code)| (authority.as_str(), code.as_str()))
    }
    /// "EPSG:32630" where it is registered, else its WKT 2: what another program needs to know it again.
    pub fn code_or_wkt(&self) -> &str {
        &self.definition
    }
    /// The definition as WKT 2 (ISO 19162:2019).
    pub fn wkt(&self) -> &str {
        &self.wkt
    }
    /// For messages: the name, with the code where it has one.
    pub fn label(&self) -> String {
        match &self.authority {
            Some((authority, code)) => format!("{} ({authority}:{code})", self.name),
            None => self.name.clone(),
        }
    }
    /// Whether it is a grid on a plane; the other kind is geographic.
    pub fn is_projected(&self) -> bool {
        self.grid.is_some()
    }
    /// Whether it is projected without changing angles, by a method known to be conformal.
    pub fn is_conformal(&self) -> bool {
        self.grid.as_ref().is_some_and(|grid| grid.conformal)
    }
    /// Whether the axes count towards west and south, as in the south-oriented grids of southern Africa.
    pub fn points_west_and_south(&self) -> bool {
        self.grid.as_ref().is_some_and(|grid| grid.reversed)
    }
    /// Metres per unit of a projected CRS.
    pub fn unit_in_metres(&self) -> Option<f64> {
        self.grid.as_ref().map(|grid| grid.unit)
    }
    /// Degrees per unit of longitude and latitude of the geographic CRS underneath.
    pub fn base_unit_in_degrees(&self) -> f64 {
        self.base.unit.to_degrees()
    }
    /// Name of the geographic CRS underneath (its own, when geographic).
    pub fn base_name(&self) -> &str {
        &self.base.name
    }
    /// Where it is meant to be used, where that is known.
    pub fn area_of_use(&self) -> Option<&AreaOfUse> {
        self.area.as_ref()
    }
    pub(super) fn base(&self) -> &Base {
        &self.base
    }
    pub(super) fn grid(&self) -> Option<&Grid> {
        self.grid.as_ref()
    }
}

/// Two CRSs are one when PROJ is fed the same definition for both.
impl PartialEq for MapCrs {
    fn eq(&self, other: &Self) -> bool {
        self.definition == other.definition
    }
}

/// A bare number is an EPSG code; a PROJ string is said to mean a CRS, not an operation.
fn spelled_for_proj(given: &str) -> String {
    if given.bytes().all(|b| b.is_ascii_digit()) {
        format!("EPSG:{given}")
    } else if given.contains("+proj=") && !given.contains("+type=crs") && !given.contains("+proj=pipeline") {
        format!("{given} +type=crs")
    } else {
        given.to_owned()
    }
}

/// The horizontal part of a compound CRS, or the CRS itself.
fn flat(crs: Object) -> Option<Object> {
    match crs.kind() {
        ObjectKind::Compound => crs.horizontal(),
        ObjectKind::Bound if crs.bound_source()?.kind() == ObjectKind::Compound => crs.bound_source()?.horizontal(),
        _ => Some(crs),
    }
}

fn unsuited(kind: ObjectKind) -> Option<&'static str> {
    match kind {
        ObjectKind::Projected | ObjectKind::Geographic => None,
        ObjectKind::Geocentric => Some("a geocentric CRS"),
        ObjectKind::Vertical => Some("a vertical CRS"),
        ObjectKind::Engineering => Some("a local engineering CRS"),
        ObjectKind::OtherCrs | ObjectKind::Compound | ObjectKind::Bound => Some("a CRS of another kind"),
        ObjectKind::NotCrs => Some("not a CRS"),
    }
}

/// The registered CRS that places coordinates just as this one does: by the code it claims when that is
/// true, else by PROJ's search of the EPSG registry.
fn registered(crs: &Object) -> Option<Object> {
    // What a search finds is a sketch: the registry's own entry has the area of use.
    let entry = |found: &Object| {
        let (authority, code) = found.authority()?;
        crs.sibling(&format!("{authority}:{code}")).filter(|known| known.same_as(crs))
    };
    entry(crs).or_else(|| crs.candidates().iter().find_map(entry))
}

/// The first words of a definition, for messages.
fn shortened(definition: &str) -> String {
    const LONGEST: usize = 60;
    let line = definition.split_whitespace().collect::<Vec<_>>().join(" ");
    match line.char_indices().nth(LONGEST) {
        Some((end, _)) => format!("{}…", &line[..end]),
        None => line,
    }
}
