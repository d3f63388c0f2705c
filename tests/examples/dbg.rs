use molkin_tests::*; use molkin_graph::Limits; use std::collections::*;
fn main(){ let a:Vec<String>=std::env::args().collect();
 let mut c=Comparer::default();
 if a.len()==2 { let k=c.canonical(&a[1]).unwrap(); for (e,l) in k.stereo_elements().iter().zip(k.labels(&Limits::default())) { println!("{:?} {:?} {:?}", e.centres.map(|a|a+1), e.mark, l); } println!("{:?}", k.remarks()); return; }
 let lines:Vec<String>=read_text(std::path::Path::new(&a[1])).lines().map(|l|l.to_owned()).collect();
 let (mut n,mut same,mut giveup,mut over,mut und,mut fail)=(0,0,0,0,0,0);
 for row in read_text(std::path::Path::new(&a[2])).lines() { let (num,exp)=row.split_once('\t').unwrap(); if exp=="!" {giveup+=1; continue}
  let s=first_word(&lines[num.parse::<usize>().unwrap()-1]);
  let Ok(k)=c.canonical(s) else {fail+=1; continue};
  let els=k.stereo_elements(); let labs=k.labels(&Limits::default());
  let mut found=BTreeSet::new(); let mut dropped:BTreeSet<usize>=BTreeSet::new();
  let marks=c.molecule(s).unwrap();
  for m in marks.drawn_stereo() { for x in m.centres { dropped.insert(x as usize+1);} }
  for (e,l) in els.iter().zip(&labs) { if let Some(l)=l.label() { for x in e.centres { found.insert((x as usize+1,l.to_string())); } }
    if *l==molkin_graph::Labelling::OverLimit {over+=1; println!("OVER {num} {:?} {s}", e.centres);} if *l==molkin_graph::Labelling::Undecided {und+=1; println!("UNDECIDED {num} {:?} {s}", e.centres.map(|x|x+1));} }
  for (e,_) in els.iter().zip(&labs) { for x in e.centres { dropped.remove(&(x as usize+1)); } }
  let exp:BTreeSet<(usize,String)>=exp.split_whitespace().map(|t|{let i=t.find(|c:char|c.is_alphabetic()).unwrap();(t[..i].parse().unwrap(),t[i..].to_owned())}).collect();
  n+=1; if found==exp {same+=1; continue;}
  let fa:BTreeMap<_,_>=found.iter().cloned().collect(); let ea:BTreeMap<_,_>=exp.iter().cloned().collect();
  let mut kinds=BTreeSet::new();
  for (x,l) in &fa { match ea.get(x) { None=>{kinds.insert("extra");}, Some(m) if m!=l=>{kinds.insert("DIFF");}, _=>{} } }
  for (x,_) in &ea { if !fa.contains_key(x) { kinds.insert(if dropped.contains(x) {"dropped"} else {"MISSING"}); } }
  println!("{:?} {num} ours-ref {:?} ref-ours {:?} {s}", kinds, found.difference(&exp).collect::<Vec<_>>(), exp.difference(&found).collect::<Vec<_>>());
 }
 println!("n {n} same {same} giveup {giveup} over {over} undecided {und} fail {fail}");
}
