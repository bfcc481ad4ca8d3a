//! The one call that the safe binding lacks.
#![allow(unsafe_code)] // gdal has no safe function for this switch.

/// From now on arcs come out of GDAL as straight segments (its default step of 4 degrees).
pub(super) fn straighten_arcs() {
    // SAFETY: sets a global boolean; called once, before any layer is read.
    unsafe { gdal_sys::OGRSetNonLinearGeometriesEnabledFlag(0) };
}
