use molkin_tests::Comparer; use molkin_graph::Limits;
fn main(){ let t=std::env::args().nth(1).unwrap(); let mut c=Comparer::default(); let k=c.canonical(&t).unwrap(); for (e,l) in k.stereo_elements().iter().zip(k.labels(&Limits::default())) { println!("{:?} {:?} {:?}", e.centres.map(|a|a+1), e.mark, l); } println!("{:?}", k.remarks()); }
