//! Molfiles, and their lines in another order.

use crate::{Numbers, read_text, shared, workspace};

/// The molfiles and SDF records of the demo, and of published SDF files that are there.
///
/// # Panics
/// If the demo cannot be read.
pub fn molfiles(published: &[&str]) -> Vec<String> {
    let demo = std::fs::read_dir(workspace("fixtures/demo")).unwrap();
    let mut paths: Vec<_> = demo.map(|entry| entry.unwrap().path()).collect();
    // Folders list their files in any order, but runs are to repeat.
    paths.sort();
    paths.retain(|path| {
        path.extension()
            .is_some_and(|ext| ext == "mol" || ext == "sdf")
    });
    paths.extend(published.iter().copied().filter_map(shared));
    let texts = paths.iter().map(|path| read_text(path));
    texts
        .flat_map(|text| {
            let records = text
                .split("$$$$\n")
                .filter(|record| !record.trim().is_empty());
            records.map(str::to_owned).collect::<Vec<_>>()
        })
        .collect()
}

/// A molfile with its atom lines, its bond lines and the ends of its plain bonds in random order;
/// numbers in property lines follow. `None` where the molfile has lines whose atom numbers this
/// does not know how to change. Data items behind it are left out.
///
/// # Panics
/// If the counts line is not that of a V2000 molfile.
pub fn renumbered_molfile(text: &str, numbers: &mut Numbers) -> Option<String> {
    let lines: Vec<&str> = text.lines().collect();
    let counts = *lines.get(3)?;
    let count = |from: usize| counts[from..from + 3].trim().parse::<usize>().unwrap();
    let (atoms, bonds) = (count(0), count(3));
    let (atom_lines, rest) = lines.get(4..)?.split_at_checked(atoms)?;
    let (bond_lines, properties) = rest.split_at_checked(bonds)?;
    let order = numbers.order(atoms);
    let mut place = vec![0; atoms];
    for (new, &old) in (1..).zip(&order) {
        place[old as usize] = new;
    }
    let mut out: Vec<String> = lines[..4].iter().map(|&line| line.to_owned()).collect();
    out.extend(order.iter().map(|&old| atom_lines[old as usize].to_owned()));
    let mut bonds: Vec<String> = bond_lines
        .iter()
        .map(|line| bond(line, &place, numbers))
        .collect();
    numbers.shuffle(&mut bonds);
    out.extend(bonds);
    for line in properties {
        out.push(property(line, &place)?);
        if line.trim_end() == END {
            break;
        }
    }
    Some(out.join("\n") + "\n")
}

/// A bond line. The first atom of a wedge is its narrow end, so only plain bonds are turned round.
fn bond(line: &str, place: &[usize], numbers: &mut Numbers) -> String {
    let end = |from: usize| place[line[from..from + 3].trim().parse::<usize>().unwrap() - 1];
    let (mut a, mut b) = (end(0), end(3));
    let plain = line.get(9..12).is_none_or(|stereo| stereo.trim() == "0");
    if plain && numbers.coin() {
        std::mem::swap(&mut a, &mut b);
    }
    format!("{a:3}{b:3}{}", &line[6..])
}

const END: &str = "M  END";

fn property(line: &str, place: &[usize]) -> Option<String> {
    if line.trim_end() == END {
        return Some(line.to_owned());
    }
    let known = ["M  CHG", "M  RAD", "M  ISO"];
    let kind = known.into_iter().find(|kind| line.starts_with(kind))?;
    let mut out = line.get(..9)?.to_owned();
    let fields: Vec<&str> = line[kind.len()..].split_whitespace().skip(1).collect();
    for entry in fields.chunks(2) {
        let [atom, value] = entry else { return None };
        let new = place.get(atom.parse::<usize>().ok()?.checked_sub(1)?)?;
        out += &format!(" {new:3} {value:>3}");
    }
    Some(out)
}
