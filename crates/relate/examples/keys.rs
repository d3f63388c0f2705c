#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use molkin_formats::smiles;
use molkin_graph::*;
use std::io::Read;
fn text(f: &str) -> String {
    let mut s = Vec::new();
    let file = std::fs::File::open(f).unwrap();
    if f.ends_with(".gz") {
        flate2::read::MultiGzDecoder::new(file)
            .read_to_end(&mut s)
            .unwrap();
    } else {
        std::io::BufReader::new(file).read_to_end(&mut s).unwrap();
    }
    String::from_utf8_lossy(&s).into_owned()
}
fn main() {
    let args: Vec<String> = std::env::args().collect();
    let mut o = Orderer::new(Limits::default());
    match args[1].as_str() {
        "sets" => {
            for f in std::fs::read_dir(&args[2]).unwrap() {
                let p = f.unwrap().path();
                if !p.to_str().unwrap().ends_with(".gz") {
                    continue;
                }
                let t = text(p.to_str().unwrap());
                let mut set = std::collections::HashSet::new();
                let mut n = 0;
                for l in t.lines() {
                    n += 1;
                    let m = smiles::parse(l.split_whitespace().next().unwrap()).unwrap();
                    set.insert(o.order(&m).unwrap().constitution_key());
                }
                println!(
                    "{} {} lines {} keys",
                    p.file_name().unwrap().to_str().unwrap(),
                    n,
                    set.len()
                );
            }
        }
        "cols" => {
            // tsv columns pairs to compare
            let t = text(&args[2]);
            let (c1, c2): (usize, usize) = (args[3].parse().unwrap(), args[4].parse().unwrap());
            let mut set = std::collections::HashSet::new();
            let (mut n, mut bad, mut err) = (0, 0, 0);
            let start = std::time::Instant::now();
            let mut worst = std::time::Duration::ZERO;
            for l in t.lines().skip(1) {
                n += 1;
                let f: Vec<&str> = l.split('\t').collect();
                let mut k = |s: &str| {
                    let m = smiles::parse(s).unwrap();
                    let st = std::time::Instant::now();
                    let r = o.order(&m).map(|c| c.compound_key());
                    worst = worst.max(st.elapsed());
                    r
                };
                match (k(f[c1]), k(f[c2])) {
                    (Ok(a), Ok(b)) => {
                        if a != b {
                            bad += 1;
                        }
                        set.insert(a);
                    }
                    (a, b) => {
                        err += 1;
                        if err < 5 {
                            println!("{a:?} {b:?} {}", f[c1]);
                        }
                    }
                }
            }
            println!(
                "{n} rows {} distinct {bad} differ {err} errors {:?} worst {:?}",
                set.len(),
                start.elapsed(),
                worst
            );
        }
        "time" => {
            let t = text(&args[2]);
            let limit: usize = args.get(3).map_or(usize::MAX, |s| s.parse().unwrap());
            let lines: Vec<&str> = t.lines().take(limit).collect();
            let mut r = smiles::Reader::new(Default::default());
            let start = std::time::Instant::now();
            let mut ms = Vec::new();
            let mut fail = 0;
            for l in &lines {
                match r.read(l, 1) {
                    Ok(m) => ms.push(m.molecule),
                    Err(e) => {
                        fail += 1;
                        if fail < 10 {
                            println!("{l}: {e}");
                        }
                    }
                }
            }
            let read = start.elapsed();
            let start = std::time::Instant::now();
            let mut e = 0;
            for (i, m) in ms.iter().enumerate() {
                if let Err(x) = o.order(m) {
                    e += 1;
                    println!("{x} {}", lines[i]);
                }
            }
            let ord = start.elapsed();
            println!(
                "{} records, read {:.2} us, order {:.2} us, failed {fail} {e}",
                lines.len(),
                read.as_secs_f64() * 1e6 / lines.len() as f64,
                ord.as_secs_f64() * 1e6 / ms.len() as f64
            );
        }
        _ => {}
    }
}
