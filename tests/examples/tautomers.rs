#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use std::io::BufRead;
use molkin_formats::smiles;
use molkin_graph::{Limits, Orderer};
use molkin_relate::{Normaliser, Structure, relate};

fn main() {
    let limits = Limits::default();
    let mut orderer = Orderer::new(limits);
    let mut normaliser = Normaliser::new(limits);
    let axes = std::env::args().nth(1).unwrap().parse().unwrap();
    for line in std::io::stdin().lock().lines() {
        let line = line.unwrap();
        let f: Vec<&str> = line.split('\t').collect();
        let mut s = Vec::new();
        for text in &f[1..3] {
            match smiles::parse(text) {
                Ok(m) => s.push(Structure::new(&mut orderer, m)),
                Err(e) => println!("{}\tunread\t{e}", f[0]),
            }
        }
        if s.len() < 2 { continue }
        let (Ok(a), Ok(b)) = (&s[0], &s[1]) else { println!("{}\tunprepared", f[0]); continue };
        let before = relate(&mut orderer, a, b).unwrap();
        let fa = normaliser.overlook(a, axes).unwrap();
        let fb = normaliser.overlook(b, axes).unwrap();
        let v = relate(&mut orderer, fa.structure(), fb.structure()).unwrap();
        let w = |s: &Structure| smiles::write(&orderer_form(s)).text;
        println!("{}\t{}/{}\t{}/{}\t{}\t{}\t{}\t{}", f[0], before.relation.as_str(), before.relation.kind().unwrap_or("-"), v.relation.as_str(), v.relation.kind().unwrap_or("-"), w(fa.structure()), w(fb.structure()), f[1], f[2]);
    }
}
fn orderer_form(s: &Structure) -> molkin_graph::CanonicalForm {
    s.canonical().form()
}
