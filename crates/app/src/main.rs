//! Crestline.
fn main() {}
