//! Domains grown from readings. All data is invented.

mod degenerate;
mod finding;
mod invariance;
mod support;
