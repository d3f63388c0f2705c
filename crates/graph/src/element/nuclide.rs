//! One nuclide of an element.

/// A nuclide: its mass number, atomic mass and share in nature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Nuclide {
    mass_number: u16,
    mass: f64,
    abundance: Option<f64>,
}

impl Nuclide {
    /// The number of protons and neutrons.
    #[must_use]
    pub const fn mass_number(&self) -> u16 {
        self.mass_number
    }

    /// The mass of the neutral atom in dalton, from AME2020.
    #[must_use]
    pub const fn mass(&self) -> f64 {
        self.mass
    }

    /// The mole fraction in terrestrial matter (0..=1), from CIAAW 2021; the middle where that is an
    /// interval. `None` for nuclides that have no part in the element's weight.
    #[must_use]
    pub const fn abundance(&self) -> Option<f64> {
        self.abundance
    }
}

/// A row of the table: a nuclide that makes up part of the element in nature.
pub(super) const fn natural(mass_number: u16, mass: f64, abundance: f64) -> Nuclide {
    Nuclide {
        mass_number,
        mass,
        abundance: Some(abundance),
    }
}

/// A row of the table: a nuclide that is absent from nature or there in traces only.
pub(super) const fn trace(mass_number: u16, mass: f64) -> Nuclide {
    Nuclide {
        mass_number,
        mass,
        abundance: None,
    }
}
