//! Keys: short, collision-resistant names of certificates.

use std::fmt;

use sha2::{Digest, Sha256};

/// The version of everything a key depends on: perception, certificate layout and hash. Changing any
/// of them changes this number; committed golden keys watch over it.
pub const KEY_VERSION: u8 = 1;

/// A 128-bit key: the first half of a SHA-256 digest (FIPS 180-4) of the key version and a canonical
/// certificate.
///
/// Written as the version, a hyphen and 32 hexadecimal digits.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Key([u8; 16]);

impl Key {
    /// The key of a sequence of words. `domain` keeps keys of different kinds apart.
    pub(crate) fn of<'a>(domain: u8, parts: impl Iterator<Item = &'a [u64]>) -> Self {
        let mut hash = Sha256::new();
        hash.update([KEY_VERSION, domain]);
        let mut bytes = Vec::new();
        for part in parts {
            bytes.clear();
            bytes.extend((part.len() as u64).to_le_bytes());
            bytes.extend(part.iter().flat_map(|word| word.to_le_bytes()));
            hash.update(&bytes);
        }
        let digest = hash.finalize();
        let mut key = [0; 16];
        key.copy_from_slice(&digest[..16]);
        Self(key)
    }

    /// The 16 bytes.
    pub fn bytes(&self) -> [u8; 16] {
        self.0
    }
}

impl fmt::Display for Key {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{KEY_VERSION}-")?;
        self.0.iter().try_for_each(|byte| write!(out, "{byte:02x}"))
    }
}
