//! Hashes that say whether what is there is what would be made.

use sha2::{Digest, Sha256};

/// The hash of all that a variant's files depend on, as 64 hexadecimal digits: the program's version, and `parts` in their order.
/// It is SHA-256 over the parts, each preceded by its length.
pub fn inputs_hash<'a>(parts: impl IntoIterator<Item = &'a [u8]>) -> String {
    let mut hash = Sha256::new();
    let version = env!("CARGO_PKG_VERSION").as_bytes();
    for part in std::iter::once(version).chain(parts) {
        add(&mut hash, part);
    }
    digits(hash)
}

/// The hash of files, as 64 hexadecimal digits: SHA-256 over their names and contents in the order of the names, each
/// preceded by its length.
pub fn files_hash<'a>(files: impl IntoIterator<Item = (&'a str, &'a [u8])>) -> String {
    let mut files: Vec<_> = files.into_iter().collect();
    files.sort_unstable();
    let mut hash = Sha256::new();
    for (name, bytes) in files {
        add(&mut hash, name.as_bytes());
        add(&mut hash, bytes);
    }
    digits(hash)
}

fn add(hash: &mut Sha256, part: &[u8]) {
    hash.update((part.len() as u64).to_le_bytes());
    hash.update(part);
}

fn digits(hash: Sha256) -> String {
    const DIGITS: [char; 16] = [
        '0', '1', '2', '3', '4', '5', '6', '7', '8', '9', 'a', 'b', 'c', 'd', 'e', 'f',
    ];
    let bytes = hash.finalize();
    bytes
        .iter()
        .flat_map(|byte| [DIGITS[usize::from(byte >> 4)], DIGITS[usize::from(byte & 15)]])
        .collect()
}

#[cfg(test)]
mod tests {
    use super::{files_hash, inputs_hash};

    #[test]
    fn parts_do_not_run_into_each_other() {
        assert_eq!(inputs_hash([&b"ab"[..], b"c"]), inputs_hash([&b"ab"[..], b"c"]));
        assert_ne!(inputs_hash([&b"ab"[..], b"c"]), inputs_hash([&b"a"[..], b"bc"]));
        assert_ne!(files_hash([("a", &b"b"[..])]), files_hash([("ab", &b""[..])]));
        // SHA-256 of nothing (FIPS 180-4 examples)
        assert_eq!(
            files_hash([]),
            "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855"
        );
    }
}
