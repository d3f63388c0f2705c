#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use molkin_formats::smiles;
use molkin_graph::*;
use molkin_relate::*;
fn main() {
    let mut o = Orderer::new(Limits::default());
    let (mut n, mut bad) = (0, 0);
    let mut run = |name: &str, a: &str, b: &str, want: &str, kind: &str, open: &str| {
        n += 1;
        let st = |o: &mut Orderer, s: &str| -> Result<Structure, String> {
            Structure::new(o, smiles::parse(s).map_err(|e| e.to_string())?)
                .map_err(|e| e.to_string())
        };
        let r = (|| {
            let x = st(&mut o, a)?;
            let y = st(&mut o, b)?;
            relate(&mut o, &x, &y).map_err(|e| e.to_string())
        })();
        match r {
            Err(e) => {
                bad += 1;
                println!("{name}: ERR {e} {a} {b}")
            }
            Ok(v) => {
                let k = v.relation.kind().unwrap_or("-");
                let okopen = match open {
                    "yes" => v.open,
                    "no" => !v.open,
                    _ => true,
                };
                if v.relation.as_str() != want || (kind != "" && k != kind) || !okopen {
                    bad += 1;
                    println!(
                        "{name}: want {want} {kind} open {open}; got {} {k} open {}  {a}   {b}",
                        v.relation.as_str(),
                        v.open
                    );
                }
            }
        }
    };
    let t = std::fs::read_to_string("docs/definitions.md").unwrap();
    for l in t.lines() {
        let f: Vec<&str> = l
            .trim()
            .trim_matches('|')
            .split('|')
            .map(|s| s.trim())
            .collect();
        if f.len() == 7 && f[1].starts_with('`') {
            run(
                f[0],
                f[1].trim_matches('`'),
                f[2].trim_matches('`'),
                f[3],
                f[4],
                f[5],
            );
        }
    }
    for (file, rel, kind) in [
        ("identical", "identical", "-"),
        ("enantiomers", "stereo", "enantiomers"),
        ("diastereomers", "stereo", "diastereomers"),
        ("undetermined", "stereo", "undetermined"),
        ("unresolved", "stereo", "unresolved"),
        ("constitutional", "constitutional", "-"),
        ("not-isomers", "not-isomers", "-"),
    ] {
        let t = std::fs::read_to_string(format!("fixtures/pairs/{file}.tsv")).unwrap();
        for l in t.lines().skip(1) {
            let f: Vec<&str> = l.split('\t').collect();
            run(f[0], f[1], f[2], rel, kind, f[3]);
        }
    }
    println!("{n} pairs {bad} bad");
}
