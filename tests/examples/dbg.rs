use molkin_tests::*; use molkin_graph::*; use std::collections::*;
fn main(){ let a:Vec<String>=std::env::args().collect();
 let mut c=Comparer::default();
 if a.len()==2 { let k=c.canonical(&a[1]).unwrap(); for (e,l) in k.stereo_elements().iter().zip(k.labels(&Limits::default())) { println!("{:?} {:?} {:?}", e.centres.map(|a|a+1), e.mark, l); } println!("{:?}", k.remarks()); return; }
 let lines:Vec<String>=read_text(std::path::Path::new(&a[1])).lines().map(|l|l.to_owned()).collect();
 for row in read_text(std::path::Path::new(&a[2])).lines() { let (num,exp)=row.split_once('\t').unwrap(); if exp=="!" {continue}
  let s=first_word(&lines[num.parse::<usize>().unwrap()-1]);
  let k=c.canonical(s).unwrap(); let m=c.molecule(s).unwrap();
  let els=k.stereo_elements(); let labs=k.labels(&Limits::default());
  let drawn:BTreeSet<usize>=m.drawn_stereo().iter().flat_map(|m|m.centres).map(|x|x as usize+1).collect();
  let mut found=BTreeMap::new();
  for (e,l) in els.iter().zip(&labs) { if let Some(l)=l.label() { for x in e.centres { found.insert(x as usize+1,l.to_string()); } } }
  let exp:BTreeMap<usize,String>=exp.split_whitespace().map(|t|{let i=t.find(|c:char|c.is_alphabetic()).unwrap();(t[..i].parse().unwrap(),t[i..].to_owned())}).collect();
  if found==exp {continue;}
  let mut why:BTreeMap<usize,String>=BTreeMap::new();
  for r in k.remarks() { match r { Remark::MarkDropped{reason,atoms} => for x in atoms { why.insert(x as usize+1,format!("{reason:?}")); }, Remark::MarkIdle{atoms}=> for x in atoms { why.insert(x as usize+1,"idle".into()); }, _=>{} } }
  let mut causes=BTreeSet::new();
  for (x,l) in &found { match exp.get(x) { None if !drawn.contains(x)=>{causes.insert("implied".to_string());}, None=>{causes.insert(format!("only-here-{}",m.atom(*x as u32-1).unwrap().element));}, Some(r) if r!=l=>{causes.insert("DIFF".into());}, _=>{} } }
  for (x,l) in &exp { if !found.contains_key(x) { causes.insert(why.get(x).cloned().unwrap_or(format!("nocause{}{l}", els.iter().any(|e|e.centres.contains(&(*x as u32-1)))))); } }
  println!("{num}\t{}\t{s}", causes.into_iter().collect::<Vec<_>>().join("+"));
 }
}
