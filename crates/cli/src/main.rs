//! molkin
fn main() {}
