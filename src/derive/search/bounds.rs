//! The largest distance that each classical bound leaves to a linear [n, k] code over GF(q).
//!
//! Exact integers throughout. Every function takes q ≥ 2 and 0 ≤ k ≤ n; without a word but zero
//! (k = 0) nothing is excluded and n is given. A value is a proven upper bound on d for every
//! linear code of those parameters, except that [`gilbert_varshamov`] gives a d that some code has.

use num_bigint::BigUint;
use num_traits::One;

/// Singleton (1964): d ≤ n − k + 1.
pub fn singleton(_q: u64, n: usize, k: usize) -> usize {
    if k == 0 { n } else { n.saturating_sub(k) + 1 }
}

/// Hamming (1950): spheres of radius ⌊(d − 1)/2⌋ are disjoint. An even d is judged by the code
/// punctured once, which has d − 1.
pub fn hamming(q: u64, n: usize, k: usize) -> usize {
    if k == 0 || k > n {
        return n;
    }
    largest(singleton(q, n, k), |d| {
        let (n, d) = if d % 2 == 0 { (n - 1, d - 1) } else { (n, d) };
        k <= n && volume(q, n, (d - 1) / 2) <= power(q, n - k)
    })
}

/// Plotkin (1960): the least weight is at most the average one, n q^(k−1)(q − 1)/(q^k − 1); the
/// same for the code shortened any number of times.
pub fn plotkin(q: u64, n: usize, k: usize) -> usize {
    if k == 0 || k > n {
        return n;
    }
    // Once q^left is beyond 2n, leaving more only lets the bound grow.
    (1..=k)
        .take_while(|&left| super::arithmetic::power(q, left - 1) <= 2 * n as u64)
        .map(|left| {
            let length = n - (k - left);
            let total = BigUint::from(length) * power(q, left - 1) * (q - 1);
            let most = total / (power(q, left) - 1u32);
            usize::try_from(most).unwrap_or(length).min(length)
        })
        .min()
        .unwrap_or(n)
}

/// Griesmer (1960; Solomon and Stiffler, 1965): n ≥ Σ ⌈d/qⁱ⌉ over 0 ≤ i < k.
pub fn griesmer(q: u64, n: usize, k: usize) -> usize {
    if k == 0 || k > n {
        return n;
    }
    largest(singleton(q, n, k), |d| {
        let (mut sum, mut part) = (0usize, d as u64);
        for step in 0..k {
            sum += part as usize;
            if part == 1 {
                sum += k - step - 1;
                break;
            }
            part = part.div_ceil(q);
        }
        sum <= n
    })
}

/// Johnson (1962), for binary codes: Hamming's count with the vectors at distance t + 1 from the
/// code added (MacWilliams and Sloane, 1977, ch. 17 §3 theorem 12). `None` for q > 2.
pub fn johnson(q: u64, n: usize, k: usize) -> Option<usize> {
    if q != 2 {
        return None;
    }
    if k == 0 || k > n {
        return Some(n);
    }
    Some(largest(singleton(q, n, k), |d| {
        let (n, d) = if d % 2 == 0 { (n - 1, d - 1) } else { (n, d) };
        k <= n && johnson_allows(n, k, d.div_ceil(2))
    }))
}

/// Whether a binary [n, k, 2δ − 1] code passes the test.
fn johnson_allows(n: usize, k: usize, delta: usize) -> bool {
    let covered = volume(2, n, delta - 1);
    let share = n / delta;
    if share > 0 {
        let next = binomial(n, delta);
        let taken = binomial(2 * delta - 1, delta) * constant_weight(n, delta, 2 * delta - 1);
        if next > taken {
            // The quotient counts for whole only when rounded up: |C| times it must fit.
            let scaled = covered * share + (next - taken);
            return scaled <= power(2, n - k) * share;
        }
    }
    covered <= power(2, n - k)
}

/// An upper bound on the number of binary vectors of length n and weight w at distance 2δ from
/// each other (Johnson, 1962): ⌊n/w ⌊(n−1)/(w−1) … ⌊(n−w+δ)/δ⌋ … ⌋⌋.
fn constant_weight(n: usize, delta: usize, w: usize) -> BigUint {
    if w > n {
        return BigUint::ZERO;
    }
    (delta..=w).fold(BigUint::one(), |most, weight| {
        most * BigUint::from(n - w + weight) / BigUint::from(weight)
    })
}

/// Elias (see van Lint, Introduction to Coding Theory, 1999, theorem 5.2.11), for n ≤ 512: with
/// θ = 1 − 1/q, q^k ≤ θnd / (r² − 2θnr + θnd) · qⁿ / V(n, r) for every r ≤ θn that makes the
/// denominator positive.
pub fn elias(q: u64, n: usize, k: usize) -> Option<usize> {
    if n > 512 || q > 1 << 16 {
        return None;
    }
    if k == 0 || k > n {
        return Some(n);
    }
    let volumes: Vec<BigUint> = (0..=n).map(|r| volume(q, n, r)).collect();
    // Everything times q, so that qθ = q − 1 is whole.
    let (q_less, q_whole, n_whole) = (i128::from(q) - 1, i128::from(q), n as i128);
    Some(largest(singleton(q, n, k), |d| {
        let top = q_less * n_whole * d as i128;
        (0..=n)
            .take_while(|&r| q_whole * r as i128 <= q_less * n_whole)
            .all(|r| {
                let radius = r as i128;
                let bottom = q_whole * radius * radius - 2 * q_less * n_whole * radius + top;
                bottom <= 0
                    || BigUint::from(bottom as u128) * &volumes[r]
                        <= BigUint::from(top as u128) * power(q, n - k)
            })
    }))
}

/// Gilbert (1952) and Varshamov (1957): some linear [n, k] code has at least this distance, as
/// V(n − 1, d − 2) < q^(n−k) lets a check matrix be built column by column.
pub fn gilbert_varshamov(q: u64, n: usize, k: usize) -> usize {
    if k == 0 || k > n {
        return n;
    }
    largest(singleton(q, n, k), |d| {
        d < 2 || volume(q, n - 1, d - 2) < power(q, n - k)
    })
}

/// The last d ≥ 1 up to which all are allowed, no more than `most`; 1 is never asked about. A
/// code of distance d is one of distance at least d − 1, so what excludes d excludes all above.
pub(super) fn largest(most: usize, allowed: impl Fn(usize) -> bool) -> usize {
    // Doubling, then halving: a test is costly for long codes.
    let (mut good, mut step) = (1usize, 1usize);
    while good + step <= most && allowed(good + step) {
        good += step;
        step *= 2;
    }
    while step > 0 {
        if good + step <= most && allowed(good + step) {
            good += step;
        }
        step /= 2;
    }
    good
}

pub(super) fn power(q: u64, exponent: usize) -> BigUint {
    BigUint::from(q).pow(exponent as u32)
}

pub(super) fn binomial(n: usize, w: usize) -> BigUint {
    super::macwilliams::binomial(n, w).magnitude().clone()
}

/// The number of vectors of length n within distance r of one.
fn volume(q: u64, n: usize, r: usize) -> BigUint {
    let mut ways = BigUint::one();
    let mut sum = BigUint::one();
    for at in 0..r.min(n) {
        ways = ways * BigUint::from(n - at) * (q - 1) / BigUint::from(at + 1);
        sum += &ways;
    }
    sum
}
