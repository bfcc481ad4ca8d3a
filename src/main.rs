//! The program `homocline`.

fn main() {}
