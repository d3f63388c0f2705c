//! The lines of a V2000 molfile in another order.

use crate::Numbers;

/// A molfile with its atom lines, its bond lines and the ends of its plain bonds in random order;
/// numbers in property lines follow. `None` where the molfile has lines whose atom numbers this
/// does not know how to change.
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

fn property(line: &str, place: &[usize]) -> Option<String> {
    if line.trim_end() == "M  END" {
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
