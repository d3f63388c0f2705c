//! Keys: short, collision-resistant names of certificates.

use std::fmt;

use sha2::{Digest as _, Sha256};

/// The version of everything a key depends on: perception, certificate layout and hash. Changing any
/// of them changes this number; committed golden keys watch over it.
pub const KEY_VERSION: u8 = 1;

/// The digest of one certificate.
pub(crate) type Digest = [u8; 32];

/// The SHA-256 digest of a certificate.
pub(crate) fn digest(certificate: &[u64]) -> Digest {
    let mut bytes = Vec::with_capacity(8 * certificate.len());
    bytes.extend(certificate.iter().flat_map(|word| word.to_le_bytes()));
    Sha256::digest(&bytes).into()
}

/// A 128-bit key: the first half of a SHA-256 digest (FIPS 180-4) of the key version and the digests
/// of canonical certificates.
///
/// Written as the version, a hyphen and 32 hexadecimal digits.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Key([u8; 16]);

impl Key {
    /// The key of a list of certificates. `domain` keeps keys of different kinds apart.
    pub(crate) fn of(domain: u8, certificates: impl Iterator<Item = Digest>) -> Self {
        let mut hash = Sha256::new();
        hash.update([KEY_VERSION, domain]);
        for digest in certificates {
            hash.update(digest);
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
