//! A string's cross-section: what it weighs, how it stretches and how it bends.

use std::f64::consts::PI;

use crate::PhysicsError;
use crate::error::within;

/// Shape of a solid core.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum CoreShape {
    /// Round wire.
    Round,
    /// Hexagonal wire, measured across flats.
    Hex,
}

/// A solid core.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Core {
    /// Round or hexagonal.
    pub shape: CoreShape,
    /// Diameter, across flats for a hexagon, mm.
    pub diameter_mm: f64,
    /// Young's modulus at playing stress, GPa.
    pub youngs_modulus_gpa: f64,
    /// Density, kg/m³.
    pub density_kg_m3: f64,
}

impl Core {
    /// Area of the cross-section, mm²: πd²/4, or (√3/2)a² for a hexagon.
    #[must_use]
    pub fn area_mm2(&self) -> f64 {
        match self.shape {
            CoreShape::Round => PI / 4.0 * self.diameter_mm.powi(2),
            CoreShape::Hex => 0.5 * 3f64.sqrt() * self.diameter_mm.powi(2),
        }
    }

    /// Second moment of area, mm⁴: πd⁴/64, or (5√3/144)a⁴ for a hexagon.
    #[must_use]
    pub fn second_moment_mm4(&self) -> f64 {
        match self.shape {
            CoreShape::Round => PI / 64.0 * self.diameter_mm.powi(4),
            CoreShape::Hex => 5.0 * 3f64.sqrt() / 144.0 * self.diameter_mm.powi(4),
        }
    }

    /// Diameter of the circle that a wrap lies on, mm: the core's own, or the corner circle 2a/√3 of a hexagon.
    #[must_use]
    pub fn wrap_circle_mm(&self) -> f64 {
        match self.shape {
            CoreShape::Round => self.diameter_mm,
            CoreShape::Hex => 2.0 * self.diameter_mm / 3f64.sqrt(),
        }
    }
}

/// A close-wound single wrap of round wire.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wrap {
    /// Outside diameter of the wound string, mm.
    pub outside_mm: f64,
    /// Density of the wire, kg/m³.
    pub density_kg_m3: f64,
}

/// Measured values, each of which overrides the computed one.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Overrides {
    /// Mass per length, kg/m.
    pub unit_mass_kg_per_m: Option<f64>,
    /// Axial stiffness, N.
    pub axial_stiffness_n: Option<f64>,
    /// Bending stiffness, N·mm².
    pub bending_stiffness_n_mm2: Option<f64>,
}

/// What the mechanics needs to know of a string.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StringProperties {
    /// Mass per length as strung at pitch, kg/m.
    pub unit_mass_kg_per_m: f64,
    /// Tangent axial stiffness EA, N.
    pub axial_stiffness_n: f64,
    /// Bending stiffness EI, N·mm².
    pub bending_stiffness_n_mm2: f64,
}

/// Mass per length of a close-wound wrap, kg/m: ρ·π²·w·(d + w)/4 with w = (D − d)/2, d the circle it lies on.
///
/// Each turn of wire, of section πw²/4, runs once round the circle of diameter d + w for every w of length.
///
/// # Errors
/// [`PhysicsError::OutOfRange`] where the outside is not larger than the circle.
pub fn wrap_mass_kg_per_m(core: &Core, wrap: &Wrap) -> Result<f64, PhysicsError> {
    let circle_mm = core.wrap_circle_mm();
    within("outside diameter in mm", wrap.outside_mm, circle_mm, f64::MAX)?;
    let wire_mm = 0.5 * (wrap.outside_mm - circle_mm);
    Ok(wrap.density_kg_m3 * PI * PI * wire_mm * (circle_mm + wire_mm) / 4.0 * 1e-6)
}

/// Properties of a string from its section: μ = ρA + wrap, EA and EI of the core alone (a wrap carries neither
/// tension nor bending), each overridden where it was measured.
///
/// # Errors
/// [`PhysicsError::OutOfRange`] where a value is not positive and finite.
pub fn string_properties(
    core: &Core,
    wrap: Option<&Wrap>,
    measured: &Overrides,
) -> Result<StringProperties, PhysicsError> {
    let wrap_mass = wrap.map_or(Ok(0.0), |wrap| wrap_mass_kg_per_m(core, wrap))?;
    let computed_mass = core.density_kg_m3 * core.area_mm2() * 1e-6 + wrap_mass;
    let modulus_n_mm2 = core.youngs_modulus_gpa * 1e3;
    let properties = StringProperties {
        unit_mass_kg_per_m: measured.unit_mass_kg_per_m.unwrap_or(computed_mass),
        axial_stiffness_n: measured.axial_stiffness_n.unwrap_or(modulus_n_mm2 * core.area_mm2()),
        bending_stiffness_n_mm2: measured
            .bending_stiffness_n_mm2
            .unwrap_or(modulus_n_mm2 * core.second_moment_mm4()),
    };
    within("unit mass in kg/m", properties.unit_mass_kg_per_m, f64::MIN_POSITIVE, 1e3)?;
    within("axial stiffness in N", properties.axial_stiffness_n, f64::MIN_POSITIVE, 1e12)?;
    within("bending stiffness in N mm²", properties.bending_stiffness_n_mm2, 0.0, 1e12)?;
    Ok(properties)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn hexagon_matches_its_corners() {
        // Area and second moment of a hexagon by the shoelace sums over its corners, across flats 2.
        let core =
            Core { shape: CoreShape::Hex, diameter_mm: 2.0, youngs_modulus_gpa: 1.0, density_kg_m3: 1.0 };
        let radius = core.wrap_circle_mm() / 2.0;
        let corner = |k: i32| (f64::from(k) * PI / 3.0).sin_cos();
        let (mut area, mut moment) = (0.0, 0.0);
        for k in 0..6 {
            let ((y0, x0), (y1, x1)) = (corner(k), corner(k + 1));
            let cross = (x0 * y1 - x1 * y0) * radius * radius;
            area += cross / 2.0;
            moment += cross * (y0 * y0 + y0 * y1 + y1 * y1) * radius * radius / 12.0;
        }
        assert!((core.area_mm2() - area).abs() < 1e-12);
        assert!((core.second_moment_mm4() - moment).abs() < 1e-12);
    }

    #[test]
    fn a_wrap_inside_its_core_is_refused() {
        let core =
            Core { shape: CoreShape::Hex, diameter_mm: 1.0, youngs_modulus_gpa: 1.0, density_kg_m3: 1.0 };
        assert!(wrap_mass_kg_per_m(&core, &Wrap { outside_mm: 1.1, density_kg_m3: 1.0 }).is_err());
    }
}
