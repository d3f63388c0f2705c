//! Reading symbols by one look into a table.

use super::table::SYMBOL_NUMBERS;

/// Second letters, and none.
const COLUMNS: usize = 27;

/// Atomic numbers by first letter, then second letter (column 0: none); 0 where there is no element.
/// Readers ask once an atom, so this is one indexed read and no comparison of strings.
static NUMBERS: [u8; 26 * COLUMNS] = numbers();

/// By atomic number: the place of the symbol in the alphabet, from 1; 0 for the wildcard.
pub(super) static PLACES: [u16; SYMBOL_NUMBERS.len() + 1] = {
    let mut places = [0; SYMBOL_NUMBERS.len() + 1];
    let mut next = 0;
    while next < SYMBOL_NUMBERS.len() {
        let (symbol, number) = SYMBOL_NUMBERS[next];
        places[number as usize] = 1 + place(symbol) as u16;
        next += 1;
    }
    places
};

/// The atomic number of a symbol in its exact case.
pub(super) fn number(symbol: &[u8]) -> Option<u8> {
    let place = match *symbol {
        [first @ b'A'..=b'Z'] => cell(first, None),
        [first @ b'A'..=b'Z', second @ b'a'..=b'z'] => cell(first, Some(second)),
        _ => return None,
    };
    NUMBERS.get(place).copied().filter(|&number| number != 0)
}

/// The place of a capital and perhaps a small letter in [`NUMBERS`].
const fn cell(first: u8, second: Option<u8>) -> usize {
    let column = match second {
        Some(letter) => letter - b'a' + 1,
        None => 0,
    };
    (first - b'A') as usize * COLUMNS + column as usize
}

/// The place of a symbol of the list.
const fn place(symbol: &str) -> usize {
    match *symbol.as_bytes() {
        [first] => cell(first, None),
        [first, second] => cell(first, Some(second)),
        _ => 0,
    }
}

/// Fills the table from the list of symbols while compiling.
const fn numbers() -> [u8; 26 * COLUMNS] {
    let mut numbers = [0; 26 * COLUMNS];
    let mut next = 0;
    // `for` isn't available in a constant function.
    while next < SYMBOL_NUMBERS.len() {
        let (symbol, number) = SYMBOL_NUMBERS[next];
        numbers[place(symbol)] = number;
        next += 1;
    }
    numbers
}
