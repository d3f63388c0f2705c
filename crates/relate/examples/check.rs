#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use molkin_formats::smiles;
use molkin_graph::*;
use molkin_relate::*;
use std::collections::BTreeMap;
fn main() {
    let dir = std::env::args().nth(1).unwrap();
    let pre = std::env::args().nth(2).unwrap_or_default();
    let read = |f: String| std::fs::read_to_string(f).unwrap();
    let a = read(format!("{dir}/{pre}a.smi"));
    let b = read(format!("{dir}/{pre}b.smi"));
    let t = read(format!("{dir}/{pre}truth.tsv"));
    let mut orderer = Orderer::new(Limits::default());
    let mut tally: BTreeMap<String, u32> = BTreeMap::new();
    let mut bad = 0;
    let start = std::time::Instant::now();
    for ((la, lb), lt) in a.lines().zip(b.lines()).zip(t.lines()) {
        let (sa, sb) = (
            la.split_whitespace().next().unwrap(),
            lb.split_whitespace().next().unwrap(),
        );
        let f: Vec<&str> = lt.split('\t').collect();
        let want = format!("{} {}", f[1], f.get(2).unwrap_or(&""));
        let mut go = || -> Result<String, String> {
            let a = Structure::new(&mut orderer, smiles::parse(sa).map_err(|e| e.to_string())?)
                .map_err(|e| e.to_string())?;
            let b = Structure::new(&mut orderer, smiles::parse(sb).map_err(|e| e.to_string())?)
                .map_err(|e| e.to_string())?;
            let v = relate(&mut orderer, &a, &b).map_err(|e| e.to_string())?;
            let same = a.canonical().compound_key() == b.canonical().compound_key();
            if same != (v.relation == Relation::Identical) {
                println!("KEY MISMATCH {sa} {sb}");
            }
            if v.relation == Relation::Constitutional
                && a.canonical().constitution_key() == b.canonical().constitution_key()
            {
                println!("CKEY {sa} {sb}");
            }
            Ok(format!(
                "{} {}",
                v.relation.as_str(),
                v.relation.kind().unwrap_or("")
            ))
        };
        let got = go().unwrap_or_else(|e| format!("ERR {e}"));
        let ok = got == want || (f.get(2).unwrap_or(&"").is_empty() && got.starts_with(f[1]));
        *tally
            .entry(format!(
                "{want} -> {}",
                if got.starts_with("ERR") { "ERR" } else { &got }
            ))
            .or_default() += 1;
        if !ok {
            bad += 1;
            if bad < 40 {
                println!("row {} want {want} got {got}\n   {sa}\n   {sb}", f[0]);
            }
        }
    }
    for (k, n) in tally {
        println!("{n:6} {k}");
    }
    println!("bad {bad} {:?}", start.elapsed());
}
