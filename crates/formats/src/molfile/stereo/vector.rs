//! Vectors in space.

use std::ops::{Add, Mul, Neg, Sub};

/// A vector or a position.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Vector(pub(super) [f64; 3]);

impl Vector {
    pub(super) fn dot(self, other: Self) -> f64 {
        let [a, b] = [self.0, other.0];
        a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
    }

    pub(super) fn cross(self, other: Self) -> Self {
        let [a, b] = [self.0, other.0];
        Self([
            a[1] * b[2] - a[2] * b[1],
            a[2] * b[0] - a[0] * b[2],
            a[0] * b[1] - a[1] * b[0],
        ])
    }

    pub(super) fn length(self) -> f64 {
        self.dot(self).sqrt()
    }

    /// The direction; `None` for a vector without length.
    pub(super) fn unit(self) -> Option<Self> {
        let length = self.length();
        (length > 1e-6).then(|| self * (1.0 / length))
    }

    /// The part at right angles to a unit vector.
    pub(super) fn across(self, axis: Self) -> Self {
        self - axis * self.dot(axis)
    }
}

/// The signed volume that three vectors span.
pub(super) fn volume(a: Vector, b: Vector, c: Vector) -> f64 {
    a.dot(b.cross(c))
}

impl Add for Vector {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        let [a, b] = [self.0, other.0];
        Self([a[0] + b[0], a[1] + b[1], a[2] + b[2]])
    }
}

impl Sub for Vector {
    type Output = Self;

    fn sub(self, other: Self) -> Self {
        self + -other
    }
}

impl Neg for Vector {
    type Output = Self;

    fn neg(self) -> Self {
        self * -1.0
    }
}

impl Mul<f64> for Vector {
    type Output = Self;

    fn mul(self, factor: f64) -> Self {
        Self(self.0.map(|value| value * factor))
    }
}
