//! Keys: short, collision-resistant names of certificates.

use std::fmt;

use sha2::{Digest as _, Sha256};

use crate::{Element, Formula};

/// The version of everything a key depends on: perception, certificate layout and hash. Changing any
/// of them changes this number; committed golden keys watch over it.
pub const KEY_VERSION: u8 = 1;

/// The digest of one certificate.
pub(crate) type Digest = [u8; 32];

/// What a digest is of, so that one thing never has the digest of the other.
const CERTIFICATE: u8 = 0;
const LIST: u8 = 1;
const FORMULA: u8 = 2;

/// Makes digests; owns the scratch.
#[derive(Debug, Default)]
pub(crate) struct Digester {
    bytes: Vec<u8>,
    /// The hash after the first certificate of a record.
    first: Sha256,
}

impl Digester {
    /// The SHA-256 digest of the first certificate of a record.
    pub(crate) fn first(&mut self, certificate: &[u64]) -> Digest {
        let Self { bytes, first } = self;
        bytes.clear();
        bytes.extend([KEY_VERSION, CERTIFICATE]);
        pack(certificate, 0, bytes);
        *first = Sha256::new_with_prefix(&bytes);
        first.clone().finalize().into()
    }

    /// The SHA-256 digest of another certificate of the record. Where marks change nothing in the
    /// order, it goes on where the first one ends, and then so does the hash.
    pub(crate) fn digest(&mut self, certificate: &[u64], first: &[u64]) -> Digest {
        let Some(rest) = certificate.strip_prefix(first) else {
            self.bytes.clear();
            self.bytes.extend([KEY_VERSION, CERTIFICATE]);
            pack(certificate, 0, &mut self.bytes);
            return Sha256::digest(&self.bytes).into();
        };
        self.bytes.clear();
        let before = first.last().copied().unwrap_or_default();
        pack(rest, before, &mut self.bytes);
        self.first
            .clone()
            .chain_update(&self.bytes)
            .finalize()
            .into()
    }
}

/// Writes words in few bytes, as hashing costs by the byte: of each word those bytes in which it
/// differs from the word before, after a byte that says which these are. Different lists of words
/// give different bytes.
fn pack(words: &[u64], mut before: u64, bytes: &mut Vec<u8>) {
    for &word in words {
        let mut change = word ^ before;
        let head = bytes.len();
        let mut places = 0;
        bytes.push(0);
        while change != 0 {
            let place = change.trailing_zeros() / 8;
            places |= 1 << place;
            bytes.push((change >> (8 * place)) as u8);
            change &= !(0xff << (8 * place));
        }
        bytes[head] = places;
        before = word;
    }
}

/// What a key names; each takes its own half of a digest.
#[derive(Debug, Clone, Copy)]
pub(crate) enum Named {
    Constitution,
    Compound,
}

/// A 128-bit key: half of a SHA-256 digest (FIPS 180-4) of the key version and a canonical
/// certificate, the first half for constitutions and the second for compounds. Where a compound is a
/// list of certificates, it is a half of the digest of their digests. The key of a formula is a half of
/// a digest of its counts.
///
/// Written as the version, a hyphen and 32 hexadecimal digits.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Key([u8; 16]);

impl Key {
    /// The key of a list of certificates, one or more, by their digests.
    pub(crate) fn of(named: Named, mut digests: impl Iterator<Item = Digest>) -> Self {
        let first = digests.next().unwrap_or_default();
        let mut digest = first;
        if let Some(second) = digests.next() {
            let mut hash = Sha256::new();
            hash.update([KEY_VERSION, LIST]);
            [first, second]
                .iter()
                .for_each(|digest| hash.update(digest));
            digests.for_each(|digest| hash.update(digest));
            digest = hash.finalize().into();
        }
        let half = match named {
            Named::Constitution => 0..16,
            Named::Compound => 16..32,
        };
        let mut key = [0; 16];
        key.copy_from_slice(&digest[half]);
        Self(key)
    }

    /// The key of a formula and of the stated nuclides (element, mass number, count; sorted): equal for
    /// records that are isomers of each other, whatever their constitution.
    pub fn of_formula(formula: &Formula, nuclides: &[(Element, u16, u32)]) -> Self {
        let mut hash = Sha256::new();
        hash.update([KEY_VERSION, FORMULA]);
        hash.update(formula.charge().to_le_bytes());
        // Isotopes count as their element in the formula, so mass number 0 is free for that.
        let elements = formula.iter().map(|(element, count)| (element, 0, count));
        for (element, mass, count) in elements.chain(nuclides.iter().copied()) {
            hash.update([element.number()]);
            hash.update(mass.to_le_bytes());
            hash.update(count.to_le_bytes());
        }
        let digest: Digest = hash.finalize().into();
        let mut key = [0; 16];
        key.copy_from_slice(&digest[..16]);
        Self(key)
    }

    /// The 16 bytes.
    pub fn bytes(&self) -> [u8; 16] {
        self.0
    }
}

const HEX: [u8; 16] = *b"0123456789abcdef";

impl fmt::Display for Key {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        // All goes out as one string: formatting byte by byte takes thirty times as long.
        let mut text = [b'-'; 34];
        text[0] = HEX[usize::from(KEY_VERSION)];
        for (byte, digits) in self.0.iter().zip(text[2..].chunks_exact_mut(2)) {
            digits[0] = HEX[usize::from(byte >> 4)];
            digits[1] = HEX[usize::from(byte & 15)];
        }
        out.write_str(str::from_utf8(&text).map_err(|_| fmt::Error)?)
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::{Digester, pack};

    fn packed(words: &[u64]) -> Vec<u8> {
        let mut bytes = Vec::new();
        pack(words, 0, &mut bytes);
        bytes
    }

    /// Reads what `pack` wrote; that it can be read is what keeps different words apart.
    fn unpacked(bytes: &[u8]) -> Vec<u64> {
        let mut bytes = bytes.iter().copied();
        let mut before = 0;
        let mut words = Vec::new();
        while let Some(places) = bytes.next() {
            for place in (0..8).filter(|place| places >> place & 1 == 1) {
                before ^= u64::from(bytes.next().unwrap()) << (8 * place);
            }
            words.push(before);
        }
        words
    }

    #[test]
    fn equal_words_take_one_byte() {
        assert_eq!(packed(&[0x0102, 0x0102, u64::MAX]).len(), 3 + 1 + 9);
        assert_eq!(packed(&[0, 0]), [0, 0]);
    }

    #[test]
    fn a_digest_is_of_the_words_alone() {
        let words = [3, 0x0102_0304, 0x0102, u64::MAX, 1 << 60, 7];
        let alone = Digester::default().first(&words);
        for first in [&words[..3], &words[..0], &words[..6], &[9, 9]] {
            let mut digester = Digester::default();
            digester.first(first);
            assert_eq!(digester.digest(&words, first), alone, "after {first:?}");
        }
    }

    proptest! {
        #[test]
        fn packed_words_can_be_read(words in proptest::collection::vec(
            prop_oneof![any::<u64>(), 0..1_000_u64, any::<u64>().prop_map(|word| word << 32)],
            0..40,
        )) {
            prop_assert_eq!(unpacked(&packed(&words)), words);
        }
    }
}
