//! The 21-point Kronrod extension of the 10-point Gauss rule.
//!
//! Constants: R. Piessens, E. de Doncker-Kapenga, C. W. Ueberhuber, D. K. Kahaner, "QUADPACK", Springer 1983, rule of 21
//! points; typed from the public-domain tables, and checked below by their degree of exactness.

/// Non-negative nodes on [-1, 1], largest first; odd positions belong to the Gauss rule.
pub(super) const NODES: [f64; 11] = [
    0.995_657_163_025_808_1,
    0.973_906_528_517_171_7,
    0.930_157_491_355_708_2,
    0.865_063_366_688_984_5,
    0.780_817_726_586_416_9,
    0.679_409_568_299_024_4,
    0.562_757_134_668_604_7,
    0.433_395_394_129_247_2,
    0.294_392_862_701_460_2,
    0.148_874_338_981_631_22,
    0.0,
];

/// Kronrod weights of those nodes.
pub(super) const KRONROD: [f64; 11] = [
    0.011_694_638_867_371_874,
    0.032_558_162_307_964_725,
    0.054_755_896_574_351_995,
    0.075_039_674_810_919_96,
    0.093_125_454_583_697_6,
    0.109_387_158_802_297_64,
    0.123_491_976_262_065_84,
    0.134_709_217_311_473_34,
    0.142_775_938_577_060_09,
    0.147_739_104_901_338_49,
    0.149_445_554_002_916_9,
];

/// Gauss weights of the nodes at odd positions.
pub(super) const GAUSS: [f64; 5] = [
    0.066_671_344_308_688_14,
    0.149_451_349_150_580_6,
    0.219_086_362_515_982_04,
    0.269_266_719_309_996_35,
    0.295_524_224_714_752_87,
];

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn both_rules_have_their_degree() {
        for power in (0..=30).step_by(2) {
            let exact = 2.0 / (f64::from(power) + 1.0);
            let kronrod: f64 =
                (0..11).map(|i| KRONROD[i] * NODES[i].powi(power) * if i == 10 { 1.0 } else { 2.0 }).sum();
            assert_relative_eq!(kronrod, exact, max_relative = 2e-15);
            let gauss: f64 = (0..5).map(|i| 2.0 * GAUSS[i] * NODES[2 * i + 1].powi(power)).sum();
            if power <= 18 {
                assert_relative_eq!(gauss, exact, max_relative = 2e-15);
            }
        }
    }
}
