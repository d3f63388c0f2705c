#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use molkin_formats::smiles;
use molkin_graph::*;
fn main() {
    let mut o = Orderer::new(Limits::default());
    let mut m = std::collections::BTreeMap::<Key, Vec<String>>::new();
    for l in std::io::stdin().lines() {
        let l = l.unwrap();
        let s = l.split_whitespace().next().unwrap().to_string();
        let k = o
            .order(&smiles::parse(&s).unwrap())
            .unwrap()
            .constitution_key();
        m.entry(k).or_default().push(s);
    }
    for v in m.values() {
        if v.len() > 1 {
            println!("{}", v.join("  "));
        }
    }
}
