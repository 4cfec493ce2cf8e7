//! GlobalIds that follow from a path-like name, so that the same part keeps its id from run to run.

use sha2::{Digest, Sha256};

/// The digits of an IFC GlobalId (IFC4, IfcGloballyUniqueId).
pub const ALPHABET: &[u8; 64] = b"0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz_$";

/// The GlobalId of a name: the first 128 bits of its SHA-256, as 22 digits of base 64, most significant first.
pub fn global_id(name: &str) -> String {
    let hash = Sha256::digest(name.as_bytes());
    let number = hash.iter().take(16).fold(0u128, |number, byte| (number << 8) | u128::from(*byte));
    compress(number)
}

/// A 128-bit number as a GlobalId.
pub fn compress(number: u128) -> String {
    (0..22).rev().map(|digit| char::from(ALPHABET[(number >> (6 * digit)) as usize & 63])).collect()
}
