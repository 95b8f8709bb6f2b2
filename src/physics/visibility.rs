//! How far one sees through smoke.

/// Extinction of flame smoke in visible light, m2/kg: 8.7 +-1.1 m2/g at 633 nm
/// (Mulholland and Croarkin 2000, from memory).
pub const SPECIFIC_EXTINCTION: f64 = 8.7e3;

/// Factor of the visibility of things that reflect light (Jin 1970, from
/// memory).
pub const REFLECTING: f64 = 3.0;

/// Factor of the visibility of lit signs (Jin 1970, from memory).
pub const LIT_SIGN: f64 = 8.0;

/// Extinction coefficient of smoke in visible light, 1/m: `K = 8.7 m2/g x
/// soot`, `soot` in kg/m3 (flaming fires; smouldering smoke has about half).
/// Below zero counts as zero.
#[must_use]
pub fn extinction_coefficient(soot: f64) -> f64 {
    SPECIFIC_EXTINCTION * soot.max(0.0)
}

/// Distance at which a thing is just seen through smoke, m: `factor/K`, at
/// most `cap`.
///
/// `factor` 3 for reflecting things, 8 for lit signs ([`REFLECTING`],
/// [`LIT_SIGN`]), `soot` in kg/m3, `cap` in m (the experiments went to some 20
/// m). Eyes that smart see less.
#[must_use]
pub fn visibility(factor: f64, soot: f64, cap: f64) -> f64 {
    let extinction = extinction_coefficient(soot);
    if extinction * cap <= factor {
        cap
    } else {
        factor / extinction
    }
}
