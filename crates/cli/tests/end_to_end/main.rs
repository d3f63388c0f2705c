//! The built program, run as a user runs it.

mod contract;
mod inputs;
mod pairing;
mod runner;
mod schema;
mod status;
mod streams;
mod text;
