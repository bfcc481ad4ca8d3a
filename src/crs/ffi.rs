//! The only calls into PROJ's C interface.
//!
//! The `proj` crate reports a failed point as a failure of its whole batch and shows neither the kind of a
//! CRS nor its base, axes or method; all of these are needed here, hence this thin layer on `proj-sys`.
#![allow(unsafe_code)]

use geo_types::Coord;
use proj_sys::*;
use std::ffi::{CStr, CString, c_char};
use std::mem::{offset_of, size_of};
use std::ptr::{NonNull, null, null_mut};
use std::rc::Rc;

/// A PROJ context: error state and database handle. Used by one thread at a time.
struct Context(NonNull<PJ_CONTEXT>);

impl Context {
    fn new() -> Option<Self> {
        // SAFETY: creating and configuring a fresh context has no preconditions.
        unsafe {
            let context = NonNull::new(proj_context_create())?;
            proj_log_level(context.as_ptr(), PJ_LOG_LEVEL_PJ_LOG_NONE);
            // The same input must give the same map on every machine: no grids fetched on the way.
            proj_context_set_enable_network(context.as_ptr(), 0);
            Some(Self(context))
        }
    }
    fn raw(&self) -> *mut PJ_CONTEXT {
        self.0.as_ptr()
    }
}

impl Drop for Context {
    fn drop(&mut self) {
        // SAFETY: the context is ours, and everything made in it keeps it alive or was dropped before.
        unsafe { proj_context_destroy(self.raw()) };
    }
}

/// What a definition turned out to be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum ObjectKind {
    Projected,
    Geographic,
    Geocentric,
    Vertical,
    Compound,
    Bound,
    Engineering,
    /// Any other kind of CRS.
    OtherCrs,
    /// An operation, a datum, an ellipsoid...
    NotCrs,
}

/// One axis of a coordinate system.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Axis {
    /// `north`, `east`, `south`, `west`...
    pub direction: String,
    /// Metres, or radians, per unit.
    pub unit: f64,
}

/// Box in degrees of longitude and latitude (west, south, east, north) and a name.
pub(super) type Area = ([f64; 4], String);

/// Anything PROJ can describe.
pub(super) struct Object {
    pj: NonNull<PJ>,
    context: Rc<Context>,
}

impl Drop for Object {
    fn drop(&mut self) {
        // SAFETY: `pj` is ours, and its context lives until this struct's fields are dropped.
        unsafe { proj_destroy(self.pj.as_ptr()) };
    }
}

impl Object {
    /// Whatever `definition` says, or PROJ's own words for why it says nothing.
    pub fn new(definition: &str) -> Result<Self, String> {
        let context = Context::new().ok_or("PROJ could not be started")?;
        Self::new_in(&Rc::new(context), definition)
    }

    fn new_in(context: &Rc<Context>, definition: &str) -> Result<Self, String> {
        let text = CString::new(definition).map_err(|_| "it holds a NUL character".to_owned())?;
        // SAFETY: context and text are live for the call.
        let pj = unsafe { proj_create(context.raw(), text.as_ptr()) };
        Self::owned(context, pj).ok_or_else(|| last_error(context))
    }

    /// A second object of the same context, so that the two can be compared.
    pub fn sibling(&self, definition: &str) -> Option<Self> {
        Self::new_in(&self.context, definition).ok()
    }

    fn owned(context: &Rc<Context>, pj: *mut PJ) -> Option<Self> {
        NonNull::new(pj).map(|pj| Self { pj, context: Rc::clone(context) })
    }

    fn derived(&self, make: unsafe extern "C" fn(*mut PJ_CONTEXT, *const PJ) -> *mut PJ) -> Option<Self> {
        // SAFETY: every function passed here takes a live context and object and returns a new object or null.
        let pj = unsafe { make(self.context.raw(), self.pj.as_ptr()) };
        Self::owned(&self.context, pj)
    }

    pub fn kind(&self) -> ObjectKind {
        // SAFETY: `pj` is a live object.
        match unsafe { proj_get_type(self.pj.as_ptr()) } {
            PJ_TYPE_PJ_TYPE_PROJECTED_CRS => ObjectKind::Projected,
            PJ_TYPE_PJ_TYPE_GEOGRAPHIC_2D_CRS | PJ_TYPE_PJ_TYPE_GEOGRAPHIC_3D_CRS => ObjectKind::Geographic,
            PJ_TYPE_PJ_TYPE_GEOCENTRIC_CRS | PJ_TYPE_PJ_TYPE_GEODETIC_CRS => ObjectKind::Geocentric,
            PJ_TYPE_PJ_TYPE_VERTICAL_CRS => ObjectKind::Vertical,
            PJ_TYPE_PJ_TYPE_COMPOUND_CRS => ObjectKind::Compound,
            PJ_TYPE_PJ_TYPE_BOUND_CRS => ObjectKind::Bound,
            PJ_TYPE_PJ_TYPE_ENGINEERING_CRS => ObjectKind::Engineering,
            PJ_TYPE_PJ_TYPE_TEMPORAL_CRS | PJ_TYPE_PJ_TYPE_OTHER_CRS => ObjectKind::OtherCrs,
            _ => ObjectKind::NotCrs,
        }
    }

    pub fn name(&self) -> Option<String> {
        // SAFETY: the text belongs to the live object and is copied at once.
        unsafe { text(proj_get_name(self.pj.as_ptr())) }
    }

    /// Authority and code the object carries.
    pub fn authority(&self) -> Option<(String, String)> {
        // SAFETY: as in `name`.
        unsafe {
            Some((text(proj_get_id_auth_name(self.pj.as_ptr(), 0))?, text(proj_get_id_code(self.pj.as_ptr(), 0))?))
        }
    }

    /// Area of use; `None` where the definition states none.
    pub fn area_of_use(&self) -> Option<Area> {
        let (mut w, mut s, mut e, mut n) = (0.0, 0.0, 0.0, 0.0);
        let mut name: *const c_char = null();
        // SAFETY: all out-pointers are live locals; the name belongs to the object and is copied at once.
        let (found, name) = unsafe {
            let pj = self.pj.as_ptr();
            let found = proj_get_area_of_use(self.context.raw(), pj, &mut w, &mut s, &mut e, &mut n, &mut name);
            (found == 1, text(name))
        };
        // PROJ says -1000 for a box that is not known.
        (found && w >= -360.0).then(|| ([w, s, e, n], name.unwrap_or_default()))
    }

    /// Horizontal part of a compound CRS.
    pub fn horizontal(&self) -> Option<Self> {
        // SAFETY: context and object are live; index 0 of a compound CRS is its horizontal part.
        let pj = unsafe { proj_crs_get_sub_crs(self.context.raw(), self.pj.as_ptr(), 0) };
        Self::owned(&self.context, pj)
    }
    /// The CRS inside a CRS that carries its own shift to another datum.
    pub fn bound_source(&self) -> Option<Self> {
        self.derived(proj_get_source_crs)
    }
    /// The geographic CRS that a projected one is built on.
    pub fn base(&self) -> Option<Self> {
        self.derived(proj_crs_get_geodetic_crs)
    }
    /// The map projection of a projected CRS.
    fn conversion(&self) -> Option<Self> {
        self.derived(proj_crs_get_coordoperation)
    }
    /// The same CRS with easting or longitude first.
    fn easting_first(&self) -> Option<Self> {
        self.derived(proj_normalize_for_visualization)
    }

    /// The EPSG code of a projected CRS's projection method.
    pub fn method(&self) -> Option<u32> {
        let conversion = self.conversion()?;
        let (mut name, mut authority, mut code) = (null(), null(), null());
        // SAFETY: out-pointers are live locals; the texts belong to `conversion` and are copied at once.
        let (authority, code) = unsafe {
            let (context, pj) = (self.context.raw(), conversion.pj.as_ptr());
            proj_coordoperation_get_method_info(context, pj, &mut name, &mut authority, &mut code);
            (text(authority)?, text(code)?)
        };
        if authority == "EPSG" { code.parse().ok() } else { None }
    }

    /// The first two axes.
    pub fn axes(&self) -> Option<[Axis; 2]> {
        let system = self.derived(proj_crs_get_coordinate_system)?;
        let axis = |index| {
            let (mut direction, mut unit) = (null(), 0.0);
            // SAFETY: PROJ skips null out-pointers; the text belongs to `system` and is copied at once.
            unsafe {
                let (context, pj) = (self.context.raw(), system.pj.as_ptr());
                let (skip, skipped) = (null_mut(), null_mut());
                let end = null_mut();
                proj_cs_get_axis_info(context, pj, index, skip, skipped, &mut direction, &mut unit, end, end, end);
                text(direction).map(|direction| Axis { direction, unit })
            }
        };
        Some([axis(0)?, axis(1)?])
    }

    /// Degrees of the prime meridian east of Greenwich.
    pub fn prime_meridian(&self) -> Option<f64> {
        let meridian = self.derived(proj_get_prime_meridian)?;
        let (mut longitude, mut unit) = (0.0, 0.0);
        // SAFETY: out-pointers are live locals; PROJ skips the null one.
        let found = unsafe {
            let pj = meridian.pj.as_ptr();
            proj_prime_meridian_get_parameters(self.context.raw(), pj, &mut longitude, &mut unit, null_mut())
        };
        (found == 1).then(|| (longitude * unit).to_degrees())
    }

    /// Square of the ellipsoid's first eccentricity.
    pub fn eccentricity_squared(&self) -> Option<f64> {
        let ellipsoid = self.derived(proj_get_ellipsoid)?;
        let (mut a, mut b) = (0.0, 0.0);
        // SAFETY: out-pointers are live locals; PROJ skips the null ones.
        let found = unsafe {
            let (context, pj) = (self.context.raw(), ellipsoid.pj.as_ptr());
            proj_ellipsoid_get_parameters(context, pj, &mut a, &mut b, null_mut(), null_mut())
        };
        (found == 1 && a > 0.0).then(|| 1.0 - (b / a) * (b / a))
    }

    /// The definition as WKT 2 (ISO 19162:2019).
    pub fn wkt(&self) -> Option<String> {
        // SAFETY: the text belongs to the live object and is copied at once.
        unsafe { text(proj_as_wkt(self.context.raw(), self.pj.as_ptr(), PJ_WKT_TYPE_PJ_WKT2_2019, null())) }
    }

    /// True where both place every coordinate alike once easting or longitude comes first.
    pub fn same_as(&self, other: &Self) -> bool {
        let (Some(a), Some(b)) = (self.easting_first(), other.easting_first()) else { return false };
        let rule = PJ_COMPARISON_CRITERION_PJ_COMP_EQUIVALENT_EXCEPT_AXIS_ORDER_GEOGCRS;
        // SAFETY: both objects and the context are live.
        unsafe { proj_is_equivalent_to_with_ctx(self.context.raw(), a.pj.as_ptr(), b.pj.as_ptr(), rule) == 1 }
    }

    /// EPSG objects that may be this one, best first.
    pub fn candidates(&self) -> Vec<Self> {
        // SAFETY: the list and the confidences are freed here, once; list members are objects of their own.
        unsafe {
            let context = self.context.raw();
            let list = proj_identify(context, self.pj.as_ptr(), c"EPSG".as_ptr(), null(), null_mut());
            if list.is_null() {
                return Vec::new();
            }
            let found = (0..proj_list_get_count(list))
                .filter_map(|i| Self::owned(&self.context, proj_list_get(context, list, i)))
                .collect();
            proj_list_destroy(list);
            found
        }
    }
}

/// How an operation gets from one datum to another at some place.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Way {
    pub name: String,
    /// The datums are taken for one because nobody published a shift (or its grid is not installed).
    pub ballpark: bool,
    /// Metres, where stated.
    pub accuracy: Option<f64>,
}

/// A way from one CRS to another, easting or longitude first on both sides. Owns its context, so it may
/// move between threads.
pub(super) struct Operation {
    pj: NonNull<PJ>,
    context: Context,
}

// SAFETY: the operation is the only user of its context (see `from_objects`), and PROJ allows a context and
// what was made in it to be used from any thread, one at a time.
unsafe impl Send for Operation {}

impl Drop for Operation {
    fn drop(&mut self) {
        // SAFETY: `pj` is ours, and its context lives until this struct's fields are dropped.
        unsafe { proj_destroy(self.pj.as_ptr()) };
    }
}

impl Operation {
    /// From one CRS to another.
    pub fn between(from: &str, to: &str) -> Result<Self, String> {
        let from = Object::new(from)?;
        let to = Object::new_in(&from.context, to)?;
        Self::from_objects(from, to)
    }

    /// From a projected CRS's own geographic CRS to the projected one: the bare map projection.
    pub fn projection_of(crs: &str) -> Result<Self, String> {
        let mut to = Object::new(crs)?;
        if to.kind() == ObjectKind::Bound {
            to = to.bound_source().ok_or("a CRS with nothing in it")?;
        }
        let from = to.base().ok_or("it has no base CRS")?;
        Self::from_objects(from, to)
    }

    fn from_objects(from: Object, to: Object) -> Result<Self, String> {
        let context = Rc::clone(&from.context);
        // SAFETY: context and objects are live, both objects belong to it; the plain operation is freed here.
        let pj = unsafe {
            let c = context.raw();
            let plain = proj_create_crs_to_crs_from_pj(c, from.pj.as_ptr(), to.pj.as_ptr(), null_mut(), null());
            if plain.is_null() {
                return Err(last_error(&context));
            }
            let normalised = proj_normalize_for_visualization(c, plain);
            proj_destroy(plain);
            NonNull::new(normalised).ok_or_else(|| last_error(&context))?
        };
        drop((from, to));
        match Rc::try_unwrap(context) {
            Ok(context) => Ok(Self { pj, context }),
            Err(shared) => {
                // SAFETY: `pj` is ours and not used again.
                unsafe { proj_destroy(pj.as_ptr()) };
                drop(shared);
                Err("another object still uses the context".to_owned())
            }
        }
    }

    /// Transforms in place; a coordinate that cannot be becomes infinite.
    pub fn forward(&mut self, coords: &mut [Coord<f64>]) {
        self.run(PJ_DIRECTION_PJ_FWD, coords);
    }
    /// The same, backwards.
    pub fn inverse(&mut self, coords: &mut [Coord<f64>]) {
        self.run(PJ_DIRECTION_PJ_INV, coords);
    }

    /// What PROJ says of the way it takes for one coordinate; `None` where that cannot be transformed.
    pub fn way(&mut self, mut at: Coord<f64>) -> Option<Way> {
        self.forward(std::slice::from_mut(&mut at));
        if !at.x.is_finite() {
            return None;
        }
        let context = self.context.raw();
        // SAFETY: the operation and its context are live; the object returned is ours and freed here, once,
        // after its name was copied.
        unsafe {
            let used = proj_trans_get_last_used_operation(self.pj.as_ptr());
            if used.is_null() {
                return None;
            }
            let accuracy = proj_coordoperation_get_accuracy(context, used);
            let way = Way {
                name: text(proj_get_name(used)).unwrap_or_default(),
                ballpark: proj_coordoperation_has_ballpark_transformation(context, used) == 1,
                accuracy: (accuracy >= 0.0).then_some(accuracy),
            };
            proj_destroy(used);
            Some(way)
        }
    }

    fn run(&mut self, direction: PJ_DIRECTION, coords: &mut [Coord<f64>]) {
        let (n, step) = (coords.len(), size_of::<Coord<f64>>());
        let base = coords.as_mut_ptr().cast::<u8>();
        // SAFETY: x and y point at the fields of the first of `n` coords, `step` bytes apart, all inside the
        // exclusively borrowed slice; PROJ touches nothing else and skips the null z and t.
        unsafe {
            let x = base.add(offset_of!(Coord<f64>, x)).cast::<f64>();
            let y = base.add(offset_of!(Coord<f64>, y)).cast::<f64>();
            proj_errno_reset(self.pj.as_ptr());
            proj_trans_generic(self.pj.as_ptr(), direction, x, step, n, y, step, n, null_mut(), 0, 0, null_mut(), 0, 0);
        }
    }
}

/// Copies a text of PROJ's; null and empty texts are none.
///
/// # Safety
/// `pointer` is null or a NUL-terminated text that lives for the call.
unsafe fn text(pointer: *const c_char) -> Option<String> {
    if pointer.is_null() {
        return None;
    }
    // SAFETY: not null, and the caller vouches for the rest.
    let text = unsafe { CStr::from_ptr(pointer) }.to_string_lossy().into_owned();
    (!text.is_empty()).then_some(text)
}

fn last_error(context: &Context) -> String {
    // SAFETY: the context is live; the text is copied at once.
    unsafe {
        let number = proj_context_errno(context.raw());
        let words = if number == 0 { None } else { text(proj_context_errno_string(context.raw(), number)) };
        words.unwrap_or_else(|| "it is not a definition PROJ knows".to_owned())
    }
}
