//! Coordinates, convergence and declination against published values and reference libraries.

mod choosing;
mod convergence;
mod definitions;
mod drawn;
mod orienting;
mod refusing;
mod support;
mod transforming;
