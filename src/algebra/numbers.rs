//! Whole numbers: primes, factors, orders. All deterministic, for 64-bit arguments.

/// `left · right mod modulus` without overflow.
pub(crate) fn mul_mod(left: u64, right: u64, modulus: u64) -> u64 {
    if left < 1 << 32 && right < 1 << 32 {
        left * right % modulus
    } else {
        (u128::from(left) * u128::from(right) % u128::from(modulus)) as u64
    }
}

/// `base^exponent mod modulus`; modulus ≥ 1.
pub fn pow_mod(base: u64, mut exponent: u64, modulus: u64) -> u64 {
    let mut square = base % modulus;
    let mut power = 1 % modulus;
    while exponent > 0 {
        if exponent & 1 == 1 {
            power = mul_mod(power, square, modulus);
        }
        square = mul_mod(square, square, modulus);
        exponent >>= 1;
    }
    power
}

/// The greatest common divisor; gcd(0, n) = n.
pub fn gcd(mut left: u64, mut right: u64) -> u64 {
    while right > 0 {
        (left, right) = (right, left % right);
    }
    left
}

const SMALL_PRIMES: [u64; 12] = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37];

/// Whether n is prime: Miller's test to the twelve prime bases up to 37, which errs for no 64-bit
/// number (Sorenson and Webster, Strong pseudoprimes to twelve prime bases, 2017).
pub fn is_prime(n: u64) -> bool {
    if n < 2 {
        return false;
    }
    for prime in SMALL_PRIMES {
        if n.is_multiple_of(prime) {
            return n == prime;
        }
    }
    let twos = (n - 1).trailing_zeros();
    let odd = (n - 1) >> twos;
    SMALL_PRIMES.iter().all(|&base| {
        let mut power = pow_mod(base, odd, n);
        if power == 1 || power == n - 1 {
            return true;
        }
        for _ in 1..twos {
            power = mul_mod(power, power, n);
            if power == n - 1 {
                return true;
            }
        }
        false
    })
}

/// The prime factors of n ≥ 1 with their exponents, ascending; empty for 0 and 1. Trial division,
/// then cycles of x² + c (Pollard, 1975).
pub fn factor_u64(mut n: u64) -> Vec<(u64, u32)> {
    let mut primes = Vec::new();
    if n == 0 {
        return Vec::new();
    }
    let mut divisor = 2;
    while divisor < 2048 && divisor * divisor <= n {
        while n.is_multiple_of(divisor) {
            primes.push(divisor);
            n /= divisor;
        }
        divisor += 1 + divisor % 2;
    }
    let mut rest = vec![n];
    while let Some(part) = rest.pop() {
        if part == 1 {
            continue;
        }
        if is_prime(part) {
            primes.push(part);
        } else {
            let factor = proper_factor(part);
            rest.push(factor);
            rest.push(part / factor);
        }
    }
    primes.sort_unstable();
    let mut factors: Vec<(u64, u32)> = Vec::new();
    for prime in primes {
        match factors.last_mut() {
            Some((last, exponent)) if *last == prime => *exponent += 1,
            _ => factors.push((prime, 1)),
        }
    }
    factors
}

/// A proper factor of a composite number.
fn proper_factor(n: u64) -> u64 {
    let root = n.isqrt();
    if root * root == n {
        return root;
    }
    for constant in 1.. {
        let next = |x| (u128::from(mul_mod(x, x, n)) + constant) % u128::from(n);
        let (mut slow, mut fast) = (2, 2);
        loop {
            slow = next(slow) as u64;
            fast = next(next(fast) as u64) as u64;
            let factor = gcd(slow.abs_diff(fast), n);
            if factor == n {
                break;
            }
            if factor > 1 {
                return factor;
            }
        }
    }
    unreachable!("a composite number has a proper factor")
}

/// p and m with p prime and p^m = order; `None` when there are none.
pub fn prime_power(order: u64) -> Option<(u64, u32)> {
    match factor_u64(order)[..] {
        [(p, m)] => Some((p, m)),
        _ => None,
    }
}

/// The least e ≥ 1 with q^e = 1 modulo n; `None` when q and n share a factor or n = 0.
pub fn order_modulo(q: u64, n: u64) -> Option<u64> {
    if n == 0 || gcd(q % n, n) != 1 {
        return None;
    }
    let phi = euler_phi(n);
    Some(reduce_order(phi, |exponent| {
        pow_mod(q, exponent, n) == 1 % n
    }))
}

/// Euler's φ(n) for n ≥ 1.
pub fn euler_phi(n: u64) -> u64 {
    factor_u64(n)
        .iter()
        .fold(n, |phi, (prime, _)| phi / prime * (prime - 1))
}

/// The least divisor of `multiple` for which `is_identity` still holds, given that it holds for
/// `multiple` itself and that the exponents where it holds are the multiples of one number.
pub(crate) fn reduce_order(multiple: u64, is_identity: impl Fn(u64) -> bool) -> u64 {
    let mut order = multiple;
    for (prime, exponent) in factor_u64(multiple) {
        for _ in 0..exponent {
            if !is_identity(order / prime) {
                break;
            }
            order /= prime;
        }
    }
    order
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn primes_and_factors_agree_with_trial_division() {
        for n in 0..3000u64 {
            let prime = n >= 2 && (2..n).all(|divisor| n % divisor != 0);
            assert_eq!(is_prime(n), prime, "{n}");
            let factors = factor_u64(n);
            assert!(factors.iter().all(|&(prime, _)| is_prime(prime)));
            if n > 0 {
                let product: u64 = factors.iter().map(|&(p, e)| p.pow(e)).product();
                assert_eq!(product, n);
            }
        }
    }

    #[test]
    fn large_numbers_factor() {
        assert_eq!(
            factor_u64(u64::MAX),
            [
                (3, 1),
                (5, 1),
                (17, 1),
                (257, 1),
                (641, 1),
                (65537, 1),
                (6_700_417, 1)
            ]
        );
        assert!(is_prime(18_446_744_073_709_551_557));
        assert_eq!(
            factor_u64(4_294_967_291 * 4_294_967_279),
            [(4_294_967_279, 1), (4_294_967_291, 1)]
        );
        assert_eq!(factor_u64(4093 * 4093 * 4093), [(4093, 3)]);
        assert_eq!(prime_power(59_049), Some((3, 10)));
        assert_eq!(prime_power(12), None);
        assert_eq!(prime_power(1), None);
        assert_eq!(prime_power(0), None);
    }

    #[test]
    fn orders_are_least() {
        for n in 1..200u64 {
            for q in 0..50u64 {
                let found = (1..=n).find(|&e| pow_mod(q, e, n) == 1 % n);
                assert_eq!(order_modulo(q, n), found, "{q} modulo {n}");
            }
        }
    }
}
