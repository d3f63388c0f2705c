//! The built program, run as a user runs it.
#![expect(clippy::unwrap_used, reason = "what tests share may fail like a test")]

mod contract;
mod families;
mod inputs;
mod interrupted;
mod pairing;
mod runner;
mod samples;
mod schema;
mod screen;
mod status;
mod streams;
mod text;
mod threads;
