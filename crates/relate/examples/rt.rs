#![allow(missing_docs, clippy::print_stdout, clippy::unwrap_used)]
use molkin_formats::smiles; use molkin_graph::*; use std::io::Read;
fn main(){ let f=std::env::args().nth(1).unwrap(); let mut s=Vec::new(); let file=std::fs::File::open(&f).unwrap(); if f.ends_with(".gz"){flate2::read::MultiGzDecoder::new(file).read_to_end(&mut s).unwrap();} else {std::io::BufReader::new(file).read_to_end(&mut s).unwrap();}
 let t=String::from_utf8_lossy(&s).into_owned(); let mut o=Orderer::new(Limits::default()); let (mut n,mut lost,mut bad,mut err)=(0,0,0,0);
 for l in t.lines(){ let x=l.split_whitespace().next().unwrap_or(""); let Ok(m)=smiles::parse(x) else {err+=1; continue}; n+=1; let c=match o.order(&m){Ok(c)=>c,Err(e)=>{println!("order {e} {x}");err+=1;continue}}; let w=smiles::write(&c.form()); if !w.lost.is_empty(){lost+=1; continue;}
  let again=smiles::parse(&w.text).map_err(|e|e.to_string()).and_then(|m|o.order(&m).map_err(|e|e.to_string())); match again{Err(e)=>{bad+=1;println!("{x} -> {} : {e}",w.text)},Ok(d)=>{ let w2=smiles::write(&d.form()); if d.compound_key()!=c.compound_key()||w2.text!=w.text||d.constitution_key()!=c.constitution_key(){bad+=1; if bad<20 {println!("{x} -> {} -> {}",w.text,w2.text);} } } } }
 println!("{f} {n} read, {err} errors, {lost} lost, {bad} bad"); }
