//! Reads a file from memory some times and prints its bytes, records, failed records, and the
//! seconds of the fastest pass.
//!
//! ```text
//! cargo run --release -p molkin-tests --example read_rate -- FILE [PASSES]
//! ```
#![allow(clippy::print_stdout)]

use std::{env, error::Error, fs, hint::black_box, time::Instant};

use molkin_formats::source::{Format, ReadOptions, Records};

fn main() -> Result<(), Box<dyn Error>> {
    let mut arguments = env::args().skip(1);
    let path = arguments.next().ok_or("a file is expected")?;
    let passes: u32 = arguments.next().map_or(Ok(5), |text| text.parse())?;
    let (format, compressed) = Format::of_name(&path).ok_or("a file of no known format")?;
    if compressed {
        return Err("what is timed is reading, not decompression".into());
    }
    let text = fs::read(&path)?;
    let (mut records, mut failed, mut fastest) = (0_u64, 0_u64, f64::INFINITY);
    for _ in 0..passes {
        (records, failed) = (0, 0);
        let start = Instant::now();
        for outcome in Records::new(
            path.as_str(),
            text.as_slice(),
            format,
            ReadOptions::default(),
        ) {
            records += 1;
            failed += u64::from(black_box(outcome?).result.is_err());
        }
        fastest = fastest.min(start.elapsed().as_secs_f64());
    }
    println!("{}\t{records}\t{failed}\t{fastest}", text.len());
    Ok(())
}
