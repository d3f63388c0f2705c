//! How much a run covers.

/// Whether `MOLKIN_FULL=1` asks for every case; without it a test on many cases takes a part of them.
pub fn is_full_run() -> bool {
    std::env::var_os("MOLKIN_FULL").is_some_and(|value| value == "1")
}
