//! A picture of the matrix: one square an entry, zero white, larger integers darker (PNG
//! Specification, third edition, W3C; zlib and deflate by RFC 1950 and RFC 1951, blocks stored).

use super::{Delivery, Format, needs_rows};

pub(super) const FORMAT: Format = Format {
    name: "png",
    extension: "png",
    says: "picture of the matrix, zero white, non-zero dark",
    write,
};

/// The most pixels a picture may have; blocks are stored, so its size in bytes is the same.
const MOST_PIXELS: usize = 1 << 26;

/// The width that a small matrix is blown up to, in pixels, and the largest square for it.
const WANTED_WIDTH: usize = 720;
const LARGEST_SQUARE: usize = 12;

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    needs_rows(delivery, FORMAT.name)?;
    let matrix = &delivery.matrix;
    let longest = matrix.rows().max(matrix.columns());
    let square = (WANTED_WIDTH / longest).clamp(1, LARGEST_SQUARE);
    let (width, height) = (matrix.columns() * square, matrix.rows() * square);
    if width.saturating_mul(height) > MOST_PIXELS {
        return Err(format!(
            "a picture of {width} by {height} pixels is more than {MOST_PIXELS}; take mtx or alist"
        ));
    }
    let largest = delivery.field.order() - 1;
    let mut pixels = Vec::with_capacity((width + 1) * height);
    for row in 0..matrix.rows() {
        let mut line = vec![0]; // filter type none
        for value in matrix.row(row) {
            // Even 1 must stand out from 0 in a large field.
            let gray = match u64::from(value) {
                0 => 255,
                value => (144 - 144 * value / largest.max(1)) as u8,
            };
            // A thin rule between the squares of small matrices.
            let rule = usize::from(square >= 6);
            line.extend(std::iter::repeat_n(gray, square - rule));
            line.extend(std::iter::repeat_n(255, rule));
        }
        for at in 0..square {
            if square >= 6 && at + 1 == square {
                pixels.push(0);
                pixels.extend(std::iter::repeat_n(255, width));
            } else {
                pixels.extend_from_slice(&line);
            }
        }
    }
    let mut header = Vec::new();
    header.extend_from_slice(&(width as u32).to_be_bytes());
    header.extend_from_slice(&(height as u32).to_be_bytes());
    header.extend_from_slice(&[8, 0, 0, 0, 0]); // 8 bits, gray, the only methods, not interlaced
    let mut out = b"\x89PNG\r\n\x1a\n".to_vec();
    chunk(&mut out, b"IHDR", &header);
    chunk(&mut out, b"IDAT", &zlib(&pixels));
    chunk(&mut out, b"IEND", &[]);
    Ok(out)
}

fn chunk(out: &mut Vec<u8>, kind: &[u8; 4], data: &[u8]) {
    out.extend_from_slice(&(data.len() as u32).to_be_bytes());
    let start = out.len();
    out.extend_from_slice(kind);
    out.extend_from_slice(data);
    let crc = crc32(&out[start..]);
    out.extend_from_slice(&crc.to_be_bytes());
}

fn zlib(data: &[u8]) -> Vec<u8> {
    let mut out = vec![0x78, 0x01];
    let blocks = data.chunks(0xffff).count();
    for (at, block) in data.chunks(0xffff).enumerate() {
        out.push(u8::from(at + 1 == blocks));
        out.extend_from_slice(&(block.len() as u16).to_le_bytes());
        out.extend_from_slice(&(!(block.len() as u16)).to_le_bytes());
        out.extend_from_slice(block);
    }
    let (mut low, mut high) = (1u32, 0u32);
    for &byte in data {
        low = (low + u32::from(byte)) % 65521;
        high = (high + low) % 65521;
    }
    out.extend_from_slice(&(high << 16 | low).to_be_bytes());
    out
}

fn crc32(data: &[u8]) -> u32 {
    let table: [u32; 256] = std::array::from_fn(|byte| {
        (0..8).fold(byte as u32, |rest, _| match rest & 1 {
            1 => 0xedb8_8320 ^ (rest >> 1),
            _ => rest >> 1,
        })
    });
    !data.iter().fold(!0, |rest: u32, &byte| {
        table[usize::from(rest as u8 ^ byte)] ^ (rest >> 8)
    })
}

#[cfg(test)]
mod tests {
    #[test]
    fn the_checksum_has_its_published_check_value() {
        // CRC-32 of "123456789": ISO 3309 / ITU-T V.42, the value usually quoted; from memory.
        assert_eq!(super::crc32(b"123456789"), 0xcbf4_3926);
    }
}
