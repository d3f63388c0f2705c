//! Places in the periodic table, by atomic number; worked out at compile time, since perception asks
//! for them several times an atom.

const COUNT: usize = super::Element::COUNT;

/// The group of each element, `None` in the f block.
pub(super) static GROUPS: [Option<u8>; COUNT] = {
    let mut groups = [None; COUNT];
    let mut number = 0;
    while number < COUNT {
        groups[number] = group(number as u8);
        number += 1;
    }
    groups
};

/// The period of each element.
pub(super) static PERIODS: [u8; COUNT] = {
    let mut periods = [0; COUNT];
    let mut number = 0;
    while number < COUNT {
        periods[number] = period(number as u8);
        number += 1;
    }
    periods
};

/// Of each element whether the octet rule says nothing of it.
pub(super) static METALS: [bool; COUNT] = {
    let mut metals = [true; COUNT];
    let mut number = 0;
    while number < COUNT {
        metals[number] = !is_nonmetal(number as u8);
        number += 1;
    }
    metals
};

const fn group(number: u8) -> Option<u8> {
    Some(match number {
        1 => 1,
        2 => 18,
        // Two elements of the s block, a gap where the d block will be, six of the p block.
        3..=4 | 11..=12 => (number - 3) % 8 + 1,
        5..=10 | 13..=18 => (number - 5) % 8 + 13,
        19..=54 => (number - 19) % 18 + 1,
        55..=56 | 87..=88 => (number - 55) % 32 + 1,
        72..=86 | 104..=118 => (number - 72) % 32 + 4,
        _ => return None,
    })
}

const fn period(number: u8) -> u8 {
    match number {
        0 => 0,
        1..=2 => 1,
        3..=10 => 2,
        11..=18 => 3,
        19..=36 => 4,
        37..=54 => 5,
        55..=86 => 6,
        _ => 7,
    }
}

const fn is_nonmetal(number: u8) -> bool {
    match group(number) {
        Some(13) => number == super::Element::BORON.0,
        Some(14) => period(number) <= 4,
        Some(15 | 16) => period(number) <= 5,
        Some(17) => true,
        _ => number == super::Element::HYDROGEN.0,
    }
}
