#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use molkin_formats::smiles;
use molkin_graph::*;
use molkin_relate::*;
fn main() {
    let d = std::env::args().nth(1).unwrap();
    let n: usize = std::env::args().nth(2).unwrap().parse().unwrap();
    let rd = |f: &str| std::fs::read_to_string(format!("{d}/{f}")).unwrap();
    let (a, b, t) = (rd("a.smi"), rd("b.smi"), rd("truth.tsv"));
    let mut o = Orderer::new(Limits::default());
    let mut l = Limits::default();
    if let Some(s) = std::env::args().nth(3) {
        l.map_steps = s.parse().unwrap();
    }
    let rows: Vec<(&str, &str)> = a
        .lines()
        .zip(b.lines())
        .zip(t.lines())
        .filter(|(_, t)| t.split('\t').nth(1) == Some("constitutional"))
        .map(|(p, _)| p)
        .collect();
    let step = rows.len() / n;
    let mut times = vec![];
    let (mut min, mut i) = (0, 0);
    let st = std::time::Instant::now();
    for k in 0..n {
        let (x, y) = rows[k * step];
        let mut s = |x: &str| {
            Structure::new(
                &mut o,
                smiles::parse(x.split_whitespace().next().unwrap()).unwrap(),
            )
            .unwrap()
        };
        let (x, y) = (s(x), s(y));
        let t0 = std::time::Instant::now();
        let e = explain(&x, &y, Relation::Constitutional, &l);
        times.push(t0.elapsed().as_secs_f64() * 1e3);
        let b = e.bonds.unwrap();
        if b.minimal {
            min += 1;
        }
        if b.at_least == b.only_in_a.len() + b.only_in_b.len() {
            i += 1;
        }
    }
    times.sort_by(|a, b| a.total_cmp(b));
    println!(
        "{n} pairs {:.1}s all proved {min} (i) {i} median {:.2} p90 {:.1} p99 {:.1}",
        st.elapsed().as_secs_f64(),
        times[n / 2],
        times[n * 9 / 10],
        times[n * 99 / 100]
    );
}
