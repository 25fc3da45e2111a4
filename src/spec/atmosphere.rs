//! The International Standard Atmosphere up to 20 km: troposphere and lower stratosphere.
//!
//! ```text
//! up to H = 11 km:   T = T0 + L H                     p = p0 (T / T0)^(-g / (L R))
//! 11 km to 20 km:    T = T11 = 216.65 K               p = p11 exp(-g (H - 11 km) / (R T11))
//! ρ = p / (R T)      a = sqrt(γ R T)
//! T0 = 288.15 K, p0 = 101325 Pa, L = -6.5 K/km, R = 287.05287 J/(kg K), g = 9.80665 m/s², γ = 1.4
//! ```
//!
//! Source: ICAO Doc 7488/3, Manual of the ICAO Standard Atmosphere, 3rd ed., 1993, tables A to C; ISO 2533:1975. The
//! constants are from memory. The altitude is taken as the geopotential one, H; at 20 km the geometric one is 63 m more.

use super::quantity::GRAVITY;

const SEA_LEVEL_TEMPERATURE: f64 = 288.15;
const SEA_LEVEL_PRESSURE: f64 = 101_325.0;
const LAPSE: f64 = -0.0065;
const GAS: f64 = 287.052_87;
const HEATS: f64 = 1.4;
const TROPOPAUSE: f64 = 11_000.0;

/// Air at an altitude.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Air {
    /// Density \[kg/m³\].
    pub(super) density: f64,
    /// Speed of sound \[m/s\].
    pub(super) sound: f64,
}

impl Air {
    /// The standard atmosphere at a geopotential altitude \[m\], -5000 m to 20000 m.
    pub(super) fn at(altitude: f64) -> Self {
        let temperature = SEA_LEVEL_TEMPERATURE + LAPSE * altitude.min(TROPOPAUSE);
        let ratio = temperature / SEA_LEVEL_TEMPERATURE;
        let mut pressure = SEA_LEVEL_PRESSURE * ratio.powf(-GRAVITY / (LAPSE * GAS));
        if altitude > TROPOPAUSE {
            pressure *= (-GRAVITY * (altitude - TROPOPAUSE) / (GAS * temperature)).exp();
        }
        Self {
            density: pressure / (GAS * temperature),
            sound: (HEATS * GAS * temperature).sqrt(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::Air;

    #[test]
    fn the_printed_standard_atmosphere() {
        // ICAO Doc 7488/3, table of the standard atmosphere against geopotential altitude: density to five digits and
        // speed of sound to six, as printed (from memory)
        for (altitude, density, sound) in [
            (0.0, 1.225_00, 340.294),
            (5_000.0, 0.736_12, 320.529),
            (10_000.0, 0.412_71, 299.463),
            (11_000.0, 0.363_92, 295.069),
            (20_000.0, 0.088_035, 295.069),
        ] {
            let air = Air::at(altitude);
            assert!(
                (air.density - density).abs() <= if density < 0.1 { 5e-7 } else { 5e-6 },
                "{altitude} {}",
                air.density
            );
            assert!((air.sound - sound).abs() < 6e-4, "{altitude} {}", air.sound);
        }
    }

    #[test]
    fn density_falls_without_a_jump() {
        for i in -50..200_i32 {
            let at = |step: f64| Air::at(f64::from(i) * 100.0 + step).density;
            assert!(at(100.0) < at(0.0));
            assert!((at(1e-6) - at(-1e-6)).abs() < 1e-9);
        }
    }
}
