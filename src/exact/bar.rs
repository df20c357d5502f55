//! One member between two joints as real frames have it: rigid zones, end springs, shear deformation, axial load.

use crate::frame::options::EndSpring;

/// A member with a flexible part of constant section between two rigid zones.
///
/// # Assumptions
/// Rigid zones turn and move with their joints. End springs sit at the faces of the zones. Plane sections; shear
/// deformation after Timoshenko, under axial load with the shear force along the normal to the bent axis (Engesser).
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Bar {
    /// Distance between the joint centres, m.
    pub length: f64,
    /// Length of the rigid zone at each end, m.
    pub zones: [f64; 2],
    /// E I of the flexible part, N m2.
    pub bending: f64,
    /// G A_s of the flexible part, N; `None` without shear deformation.
    pub shear: Option<f64>,
    /// Springs between the zones and the flexible part.
    pub springs: [EndSpring; 2],
    /// Axial compression, N; negative in tension.
    pub compression: f64,
}

/// What a member's movements make of its ends.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct BarForces {
    /// Moments on the member at the joint centres, clockwise, N m.
    pub joint: [f64; 2],
    /// Moments at the faces of the rigid zones, clockwise, N m.
    pub face: [f64; 2],
    /// Force across the chord between the joint centres in its unmoved direction, N: a column's resistance to the right.
    pub shear: f64,
}

impl Bar {
    /// E I / length, N m.
    fn stiffness(&self) -> f64 {
        self.bending / self.length
    }

    fn flexible_length(&self) -> f64 {
        self.length - self.zones[0] - self.zones[1]
    }

    /// Whether nothing but bending acts between the joint centres.
    fn is_plain(&self) -> bool {
        self.zones == [0.0; 2]
            && self.shear.is_none()
            && self.springs == [EndSpring::Rigid; 2]
            && self.compression == 0.0
    }

    /// (alpha l)^2 of the flexible part, alpha^2 = P / (E I (1 - P / G A_s)); negative in tension.
    pub(super) fn axial_parameter(&self) -> f64 {
        let shear_softening = self.shear.map_or(1.0, |shear| 1.0 - self.compression / shear);
        self.compression * self.flexible_length().powi(2) / (self.bending * shear_softening)
    }

    /// Stiffness matrix for the rotations of both joints and of the chord between their centres, N m.
    ///
    /// # Formula
    /// T' S T - P (l t t' + a e_1 e_1' + b e_2 e_2'): S the face moments against face rotations relative to the chord of
    /// the flexible part, T and t from joint and chord rotations to those and to that chord, a and b the rigid zones. The
    /// third row gives shear times length.
    pub(super) fn matrix(&self) -> [[f64; 3]; 3] {
        if self.is_plain() {
            let k = self.stiffness();
            return [[4.0 * k, 2.0 * k, -6.0 * k], [2.0 * k, 4.0 * k, -6.0 * k], [-6.0 * k, -6.0 * k, 12.0 * k]];
        }
        let (stiffness, chord, turns) = (self.face_stiffness(), self.chord(), self.turns());
        let element = |i: usize, j: usize| {
            let bent: f64 = (0..2)
                .flat_map(|a| (0..2).map(move |b| (a, b)))
                .map(|(a, b)| turns[a][i] * stiffness[a][b] * turns[b][j])
                .sum();
            let zone = if i == j && i < 2 { self.zones[i] } else { 0.0 };
            bent - self.compression * (self.flexible_length() * chord[i] * chord[j] + zone)
        };
        [0, 1, 2].map(|i| [0, 1, 2].map(|j| element(i, j)))
    }

    /// Forces at the ends for (rotation of the first joint, of the second, of the chord between their centres).
    pub(super) fn forces(&self, moved: [f64; 3]) -> BarForces {
        if self.is_plain() {
            let [near, far, chord] = moved;
            let end = |near: f64, far: f64| 2.0 * self.stiffness() * (2.0 * near + far - 3.0 * chord);
            let joint = [end(near, far), end(far, near)];
            return BarForces { joint, face: joint, shear: -(joint[0] + joint[1]) / self.length };
        }
        let times = |row: [f64; 3]| row.iter().zip(moved).map(|(a, b)| a * b).sum::<f64>();
        let [first, second, chord] = self.matrix().map(times);
        let turned = self.turns().map(times);
        let face = self.face_stiffness().map(|row| row[0] * turned[0] + row[1] * turned[1]);
        BarForces { joint: [first, second], face, shear: chord / self.length }
    }

    /// Rotation of the flexible part's chord from the three movements.
    fn chord(&self) -> [f64; 3] {
        let flexible = self.flexible_length();
        [-self.zones[0] / flexible, -self.zones[1] / flexible, self.length / flexible]
    }

    /// Face rotations relative to the flexible part's chord from the three movements.
    fn turns(&self) -> [[f64; 3]; 2] {
        let [first, second, chord] = self.chord();
        [[1.0 - first, -second, -chord], [-first, 1.0 - second, -chord]]
    }

    /// Face moments for unit face rotations relative to the chord of the flexible part, N m.
    ///
    /// # Formula
    /// The inverse of the flexibility (l / E I) [f, -g; -g, f] + 1 / (G A_s l) [1, 1; 1, 1] + diag(1 / springs), with
    /// f = (1 - x cot x) / x^2, g = (x / sin x - 1) / x^2, x = alpha l.
    ///
    /// # References
    /// Stability functions: R. K. Livesley, D. B. Chandler, 1956; W. Merchant (from memory; derived anew for shear).
    fn face_stiffness(&self) -> [[f64; 2]; 2] {
        if self.bending == 0.0 {
            return [[0.0; 2]; 2];
        }
        let (f, g) = stability(self.axial_parameter());
        let bent = self.flexible_length() / self.bending;
        let sheared = self.shear.map_or(0.0, |shear| 1.0 / (shear * self.flexible_length()));
        let own = |spring: EndSpring| match spring {
            EndSpring::Spring(stiffness) => 1.0 / stiffness,
            EndSpring::Rigid | EndSpring::Hinge => 0.0,
        };
        let near = bent * f + sheared + own(self.springs[0]);
        let far = bent * f + sheared + own(self.springs[1]);
        let cross = sheared - bent * g;
        match self.springs.map(|spring| spring == EndSpring::Hinge) {
            [true, true] => [[0.0; 2]; 2],
            [true, false] => [[0.0, 0.0], [0.0, 1.0 / far]],
            [false, true] => [[1.0 / near, 0.0], [0.0, 0.0]],
            [false, false] => {
                let determinant = near * far - cross * cross;
                [[far / determinant, -cross / determinant], [-cross / determinant, near / determinant]]
            }
        }
    }
}

/// Below this (alpha l)^2 the series of [`stability`] is used: its first term left out is under 1e-15 there.
const SMALL: f64 = 0.01;

/// f and g of [`Bar::face_stiffness`] for x^2, which is negative in tension; 1/3 and 1/6 without axial force.
fn stability(squared: f64) -> (f64, f64) {
    if squared.abs() < SMALL {
        let series = |terms: [f64; 5]| terms.iter().rev().fold(0.0, |sum, term| sum * squared + term);
        let f = series([1.0 / 3.0, 1.0 / 45.0, 2.0 / 945.0, 1.0 / 4725.0, 2.0 / 93_555.0]);
        let g = series([1.0 / 6.0, 7.0 / 360.0, 31.0 / 15_120.0, 127.0 / 604_800.0, 73.0 / 3_421_440.0]);
        return (f, g);
    }
    let x = squared.abs().sqrt();
    let (cotangent, sine) = match squared > 0.0 {
        true => (1.0 / libm::tan(x), libm::sin(x)),
        false => (1.0 / libm::tanh(x), libm::sinh(x)),
    };
    ((1.0 - x * cotangent) / squared, (x / sine - 1.0) / squared)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn plain() -> Bar {
        Bar {
            length: 4.0,
            zones: [0.0; 2],
            bending: 8.0,
            shear: None,
            springs: [EndSpring::Rigid; 2],
            compression: 0.0,
        }
    }

    fn close(a: [[f64; 3]; 3], b: [[f64; 3]; 3], tolerance: f64) {
        for (a, b) in a.as_flattened().iter().zip(b.as_flattened()) {
            assert!((a - b).abs() <= tolerance, "{a} {b}");
        }
    }

    #[test]
    fn every_option_fades_into_the_plain_member() {
        let plain = plain();
        let reference = plain.matrix();
        close(Bar { zones: [1e-9, 1e-9], ..plain }.matrix(), reference, 1e-7);
        close(Bar { shear: Some(1e12), ..plain }.matrix(), reference, 1e-8);
        close(Bar { springs: [EndSpring::Spring(1e12); 2], ..plain }.matrix(), reference, 1e-8);
        close(Bar { compression: 1e-9, ..plain }.matrix(), reference, 1e-7);
    }

    #[test]
    fn series_and_functions_meet() {
        for sign in [-1.0, 1.0] {
            let (below, above) = (stability(sign * SMALL * (1.0 - 1e-12)), stability(sign * SMALL));
            assert!((below.0 - above.0).abs() < 1e-13 && (below.1 - above.1).abs() < 1e-13);
        }
    }

    #[test]
    fn a_weak_spring_is_a_hinge() {
        let weak = Bar { springs: [EndSpring::Spring(1e-12), EndSpring::Rigid], ..plain() };
        let hinged = Bar { springs: [EndSpring::Hinge, EndSpring::Rigid], ..plain() };
        close(weak.matrix(), hinged.matrix(), 1e-10);
    }

    /// A member pinned at both ends buckles at P = pi^2 E I / l^2 (L. Euler): the chord then turns without resistance
    /// to curvature, which shows as an infinite f.
    #[test]
    fn eulers_load_is_where_the_pinned_member_gives_way() {
        let euler = std::f64::consts::PI.powi(2);
        assert!(stability(euler * (1.0 - 1e-9)).0 > 1e6);
        assert!(stability(euler * (1.0 + 1e-9)).0 < -1e6);
    }
}
