//! Thermal emissivity of a smoke layer: carbon dioxide and water vapour, and
//! soot.

/// One weighted sum of three grey gases: absorption coefficients in
/// 1/(atm m) and polynomials of the weights in the temperature in K.
#[derive(Debug, Clone, Copy)]
struct GreyGases {
    /// Water's share of the partial pressures, `p_w/(p_w + p_c)`.
    water_share: f64,
    absorption: [f64; 3],
    weight: [[f64; 4]; 3],
}

/// Smith, Shen and Friedman 1982 (J Heat Transfer 104:602), total pressure 1
/// atm, 600-2400 K, 0.001-10 atm m; coefficients from memory: carbon dioxide
/// alone, water to carbon dioxide 1:1 and 2:1, water vapour alone (dilute).
const TABLE: [GreyGases; 4] = [
    GreyGases {
        water_share: 0.0,
        absorption: [0.3966, 15.64, 394.3],
        weight: [
            [0.043_34, 2.620e-4, -1.560e-7, 2.565e-11],
            [-0.048_14, 2.822e-4, -1.794e-7, 3.274e-11],
            [0.054_92, 0.1087e-4, -0.3500e-7, 0.9123e-11],
        ],
    },
    GreyGases {
        water_share: 0.5,
        absorption: [0.4303, 7.055, 178.1],
        weight: [
            [0.5150, -2.303e-4, 0.9779e-7, -1.494e-11],
            [0.077_49, 3.399e-4, -2.297e-7, 3.770e-11],
            [0.1907, -1.824e-4, 0.5608e-7, -0.5122e-11],
        ],
    },
    GreyGases {
        water_share: 2.0 / 3.0,
        absorption: [0.4201, 6.516, 131.9],
        weight: [
            [0.6508, -5.551e-4, 3.029e-7, -5.353e-11],
            [-0.025_04, 6.112e-4, -3.882e-7, 6.528e-11],
            [0.2718, -3.118e-4, 1.221e-7, -1.612e-11],
        ],
    },
    GreyGases {
        water_share: 1.0,
        absorption: [0.4098, 6.325, 120.5],
        weight: [
            [0.5977, -5.119e-4, 3.042e-7, -5.564e-11],
            [0.056_77, 3.333e-4, -1.967e-7, 2.718e-11],
            [0.1800, -2.334e-4, 1.008e-7, -1.454e-11],
        ],
    },
];

/// Lowest and highest temperature of the polynomials as used, K. Below 600 K
/// they run on beyond their fit and stay within physical bounds.
const TEMPERATURES: [f64; 2] = [300.0, 2400.0];

/// Density of soot, kg/m3 (common value).
pub const SOOT_DENSITY: f64 = 1800.0;

/// Planck-mean absorption of soot per volume fraction and kelvin, 1/(m K)
/// (de Ris 1979 and Drysdale's table give 1186 to about 1300, from memory).
pub const SOOT_ABSORPTION: f64 = 1300.0;

/// Emissivity of a mixture of carbon dioxide and water vapour with clear
/// gases, 0 to 1, by a weighted sum of grey gases.
///
/// `eps = sum_i a_i(T) (1 - exp(-k_i (p_c + p_w) L))`, partial pressures in atm,
/// path `length_m` in m, `temperature_k` of the gas (held within 300 to 2400
/// K). Coefficients run linearly in water's share between the published tables
/// for carbon dioxide alone, 1:1, 2:1 and water alone. Zero without either gas
/// or path. Source and range: Smith, Shen and Friedman 1982, see the table.
#[must_use]
pub fn gas_emissivity(
    temperature_k: f64,
    carbon_dioxide_atm: f64,
    water_atm: f64,
    length_m: f64,
) -> f64 {
    let dioxide = carbon_dioxide_atm.max(0.0);
    let water = water_atm.max(0.0);
    let path = (dioxide + water) * length_m;
    if path.is_nan() || path <= 0.0 {
        return 0.0;
    }
    let share = water / (dioxide + water);
    let after = if share <= 0.5 {
        1
    } else if share <= TABLE[2].water_share {
        2
    } else {
        3
    };
    let (low, high) = (&TABLE[after - 1], &TABLE[after]);
    let part = (share - low.water_share) / (high.water_share - low.water_share);
    let t = temperature_k.clamp(TEMPERATURES[0], TEMPERATURES[1]);
    let cubic = |b: &[f64; 4]| b[0] + t * (b[1] + t * (b[2] + t * b[3]));
    let mut sum = 0.0;
    for i in 0..3 {
        let k = low.absorption[i] + part * (high.absorption[i] - low.absorption[i]);
        let from = cubic(&low.weight[i]);
        let weight = from + part * (cubic(&high.weight[i]) - from);
        sum -= weight * (-k * path).exp_m1();
    }
    sum.clamp(0.0, 1.0)
}

/// Absorption coefficient of soot in its own heat radiation, 1/m.
///
/// `k = 1300 fv T`, `fv = soot / 1800 kg/m3`: 0.72 m2/g at 1000 K, twelve times
/// less than visible light meets. `soot_kg_m3` in kg/m3, below zero counts as
/// zero.
#[must_use]
pub fn soot_absorption(temperature_k: f64, soot_kg_m3: f64) -> f64 {
    SOOT_ABSORPTION * soot_kg_m3.max(0.0) / SOOT_DENSITY * temperature_k
}

/// Emissivity of a smoke layer, 0 to 1:
/// `1 - (1 - eps_gas) exp(-k_soot L)`.
///
/// `temperature_k` of the layer; `x_co2`, `x_h2o` mole fractions; `soot_kg_m3`;
/// `mean_beam_length` in m; `pressure_atm` total pressure. Taken as grey, so
/// it is also the layer's absorptivity. Range and limits: see
/// [`gas_emissivity`] and [`soot_absorption`].
#[must_use]
pub fn layer_emissivity(
    temperature_k: f64,
    x_co2: f64,
    x_h2o: f64,
    soot_kg_m3: f64,
    mean_beam_length: f64,
    pressure_atm: f64,
) -> f64 {
    let gas = gas_emissivity(
        temperature_k,
        x_co2 * pressure_atm,
        x_h2o * pressure_atm,
        mean_beam_length,
    );
    let soot = soot_absorption(temperature_k, soot_kg_m3) * mean_beam_length.max(0.0);
    1.0 - (1.0 - gas) * (-soot).exp()
}

/// Mean beam length of a gas volume, m: `3.6 V/A`, volume in m3 over its whole
/// bounding area in m2 (Hottel; 0.9 of the thin-gas value 4 V/A, from memory).
/// Zero without volume or area.
#[must_use]
pub fn mean_beam_length(volume: f64, area: f64) -> f64 {
    if volume <= 0.0 || area <= 0.0 {
        return 0.0;
    }
    3.6 * volume / area
}
