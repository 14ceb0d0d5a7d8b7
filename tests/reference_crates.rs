//! The same message, encoded by crates that nobody here wrote, must be a word of the code that a
//! spec describes: `crc`, `reed-solomon` and `reed-solomon-erasure` from crates.io.

mod common;

use common::with_spec;

/// Whether words lie in the code `subject` of a spec.
fn membership(spec: &str, words: &[Vec<u32>]) -> Vec<bool> {
    with_spec(spec, |view| {
        let messages: Vec<&String> = view
            .findings
            .iter()
            .map(|finding| &finding.message)
            .collect();
        let checked = view
            .codes
            .iter()
            .find(|checked| checked.compiled.name == "subject");
        let code = &checked
            .unwrap_or_else(|| panic!("not built: {messages:?}"))
            .compiled
            .code;
        words.iter().map(|word| code.contains(word)).collect()
    })
}

fn message(length: usize, seed: u64) -> Vec<u8> {
    let mut state = seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) | 1;
    (0..length)
        .map(|_| {
            state ^= state << 13;
            state ^= state >> 7;
            state ^= state << 17;
            (state >> 24) as u8
        })
        .collect()
}

fn bits(bytes: &[u8]) -> Vec<u32> {
    bytes
        .iter()
        .flat_map(|byte| (0..8).rev().map(move |at| u32::from(byte >> at & 1)))
        .collect()
}

/// A word with one symbol changed must be refused, so that membership can fail.
fn spoilt(word: &[u32]) -> Vec<u32> {
    let mut word = word.to_vec();
    let at = word.len() / 3;
    word[at] ^= 1;
    word
}

fn assert_words(spec: &str, words: Vec<Vec<u32>>) {
    let spoilt: Vec<Vec<u32>> = words.iter().map(|word| spoilt(word)).collect();
    assert!(
        membership(spec, &words).iter().all(|&inside| inside),
        "a word is refused: {spec}"
    );
    assert!(
        !membership(spec, &spoilt).iter().any(|&inside| inside),
        "a spoilt word is taken: {spec}"
    );
}

/// A plain algorithm without initial value, reflection or complement.
const fn plain<W: crc::Width + Copy>(poly: W, zero: W, width: u8) -> crc::Algorithm<W> {
    crc::Algorithm {
        width,
        poly,
        init: zero,
        refin: false,
        refout: false,
        xorout: zero,
        check: zero,
        residue: zero,
    }
}

#[test]
fn a_16_bit_crc_agrees_with_the_crc_crate() {
    static ITU: crc::Algorithm<u16> = plain(0x1021, 0, 16);
    let words = (1..6)
        .map(|seed| {
            let data = message(9, seed);
            let check = crc::Crc::<u16>::new(&ITU).checksum(&data);
            bits(&[data, check.to_be_bytes().to_vec()].concat())
        })
        .collect();
    assert_words(
        "field bit = GF(2)\ncode subject over bit = crc_16_itu(88)\n",
        words,
    );
}

#[test]
fn a_32_bit_crc_agrees_with_the_crc_crate() {
    static ETHERNET: crc::Algorithm<u32> = plain(0x04c1_1db7, 0, 32);
    static STORAGE: crc::Algorithm<u32> = plain(0x1edc_6f41, 0, 32);
    for (algorithm, name) in [(&ETHERNET, "crc_32_ethernet"), (&STORAGE, "crc_32_storage")] {
        let words = (1..6)
            .map(|seed| {
                let data = message(14, seed);
                let check = crc::Crc::<u32>::new(algorithm).checksum(&data);
                bits(&[data, check.to_be_bytes().to_vec()].concat())
            })
            .collect();
        assert_words(
            &format!("field bit = GF(2)\ncode subject over bit = {name}(144)\n"),
            words,
        );
    }
}

#[test]
fn reed_solomon_parity_agrees_with_the_reed_solomon_crate() {
    let spec = "field byte = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1\n\
                code subject over byte = reed_solomon(length: 40, dimension: 28, first_root: 0)\n";
    let words = (1..6)
        .map(|seed| {
            let encoded = reed_solomon::Encoder::new(12).encode(&message(28, seed));
            encoded.iter().map(|&byte| u32::from(byte)).collect()
        })
        .collect();
    assert_words(spec, words);
}

#[test]
fn another_first_root_gives_other_words() {
    let spec = "field byte = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1\n\
                code subject over byte = reed_solomon(length: 40, dimension: 28, first_root: 1)\n";
    let encoded = reed_solomon::Encoder::new(12).encode(&message(28, 1));
    let word: Vec<u32> = encoded.iter().map(|&byte| u32::from(byte)).collect();
    assert_eq!(membership(spec, &[word]), [false]);
}

#[test]
fn erasure_shards_agree_with_the_reed_solomon_erasure_crate() {
    // That crate takes the values of polynomials of degree below 5 at the elements 0 to 7, in the
    // form that leaves the first five as they are.
    let spec = "field byte = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1\n\
                code subject over byte\n\
                \x20 = evaluate(monomials in 1 variables where degree < 5, at: points (x) where x in {0..7})\n\
                \x20 is [8, 5, 4]\n\
                \x20 require mds\n";
    let coder =
        reed_solomon_erasure::galois_8::ReedSolomon::new(5, 3).expect("five and three shards");
    let mut shards: Vec<Vec<u8>> = (0..5).map(|at| message(6, at + 1)).collect();
    shards.extend(vec![vec![0; 6]; 3]);
    coder.encode(&mut shards).expect("shards of one length");
    let words = (0..6)
        .map(|at| shards.iter().map(|shard| u32::from(shard[at])).collect())
        .collect();
    assert_words(spec, words);
}
