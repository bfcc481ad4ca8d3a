//! From a stack of structural readings to domains, fabric statistics and map layers that draw right.
//!
//! The floors, lowest first; a folder uses only floors below its own (`tests/architecture.rs` keeps this true):
//! 0 [`notice`], [`orientation`] · 1 [`table`] · 2 [`station`] · 3 [`crs`], [`fabric`] · 4 [`domain`], [`mod@format`] ·
//! 5 [`input`], [`symbol`] · 6 [`layer`], [`style`] · 7 [`job`] · 8 [`cli`].

pub mod cli;
pub mod crs;
pub mod domain;
pub mod fabric;
pub mod format;
pub mod input;
pub mod job;
pub mod layer;
pub mod notice;
pub mod orientation;
pub mod station;
pub mod style;
pub mod symbol;
pub mod table;
