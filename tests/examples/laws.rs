#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use std::collections::{BTreeMap, VecDeque};
use molkin_formats::smiles;
use molkin_graph::{Limits, Molecule, Orderer, Key};
use molkin_relate::{Axes, Normaliser, Structure};
use molkin_tests::{Numbers, renumbered, shifted, read_text, first_word};

fn main() {
    let mut args = std::env::args().skip(1);
    let step: usize = args.next().unwrap().parse().unwrap();
    let most: usize = args.next().unwrap().parse().unwrap();
    let limits = Limits::default();
    let mut orderer = Orderer::new(limits);
    let mut normaliser = Normaliser::new(limits);
    let tautomer: Axes = "tautomer".parse().unwrap();
    let both: Axes = "tautomer,stereo".parse().unwrap();
    let mut numbers = Numbers::new(7);
    let (mut n, mut bad, mut members, mut mobile) = (0, 0, 0, 0);
    for file in args {
        for line in read_text(std::path::Path::new(&file)).lines().step_by(step) {
            let text = first_word(line);
            let Ok(m) = smiles::parse(text) else { continue };
            n += 1;
            let mut key = |m: Molecule, axes: Axes| -> Option<(Key, Molecule)> {
                let s = Structure::new(&mut orderer, m).ok()?;
                let f = normaliser.overlook(&s, axes).map_err(|e| println!("{text} {e}")).ok()?;
                let f = f.structure();
                Some((f.canonical().compound_key(), f.molecule().clone()))
            };
            let Some((k, f)) = key(m.clone(), tautomer) else { println!("nokey {text}"); bad+=1; continue };
            let k2 = key(f.clone(), tautomer);
            if k2.as_ref().map(|x| x.0) != Some(k) { let mut o = Orderer::new(limits); let w = |o: &mut Orderer, m: &Molecule| smiles::write(&o.order(m).unwrap().form()).text; println!("twice {text}  {}  {}", w(&mut o, &f), w(&mut o, &k2.unwrap().1)); bad += 1 }
            for _ in 0..3 {
                let k3 = key(renumbered(&m, &mut numbers), tautomer).map(|x| x.0);
                if k3 != Some(k) { println!("renumbered {text}"); bad += 1; break }
            }
            if most == 0 { continue }
            let k = key(m.clone(), both).unwrap().0;
            let mut seen = BTreeMap::new();
            let mut queue = VecDeque::from([m.clone()]);
            let mut count = 0;
            let mut o2 = Orderer::new(limits);
            'all: while let Some(next) = queue.pop_front() {
                for other in shifted(&next) {
                    let own = o2.order(&other).unwrap().compound_key();
                    if seen.insert(own, ()).is_some() { continue }
                    count += 1;
                    let k4 = key(other.clone(), both).map(|x| x.0);
                    if k4 != Some(k) {
                        println!("member {text}  {}", smiles::write(&o2.order(&other).unwrap().form()).text); bad += 1; break 'all }
                    if count >= most { break 'all }
                    queue.push_back(other);
                }
            }
            members += count; mobile += usize::from(count > 0);
        }
    }
    println!("{n} structures, {mobile} with members, {members} members, {bad} bad");
}
