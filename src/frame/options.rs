//! Provisional.
use super::Frame;
/// End spring.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum EndSpring {
    /// Rigid.
    Rigid,
    /// Hinge.
    Hinge,
    /// Spring, N m/rad.
    Spring(f64),
}
/// Options.
#[derive(Debug, Clone, PartialEq)]
pub struct AnalysisOptions {
    /// G.
    pub shear_modulus: Option<f64>,
    /// Columns.
    pub column_shear_area: Vec<Option<f64>>,
    /// Beams.
    pub beam_shear_area: Vec<Option<f64>>,
    /// Springs.
    pub beam_springs: Vec<[EndSpring; 2]>,
    /// Zones.
    pub column_zones: Vec<[f64; 2]>,
    /// Zones.
    pub beam_zones: Vec<[f64; 2]>,
    /// Gravity.
    pub gravity: Option<Vec<f64>>,
}
impl AnalysisOptions {
    /// Plain.
    pub fn plain(frame: &Frame) -> Self {
        let (c, b) = (frame.storeys() * frame.lines(), frame.storeys() * frame.bays());
        Self {
            shear_modulus: None,
            column_shear_area: vec![None; c],
            beam_shear_area: vec![None; b],
            beam_springs: vec![[EndSpring::Rigid; 2]; b],
            column_zones: vec![[0.0; 2]; c],
            beam_zones: vec![[0.0; 2]; b],
            gravity: None,
        }
    }
    /// Plain.
    pub fn is_plain(&self) -> bool {
        let shear = self.column_shear_area.iter().chain(&self.beam_shear_area).all(Option::is_none);
        shear
            && self.gravity.is_none()
            && !self.has_zones()
            && self.beam_springs.iter().all(|s| *s == [EndSpring::Rigid; 2])
    }
    /// Zones.
    pub fn has_zones(&self) -> bool {
        self.column_zones.iter().chain(&self.beam_zones).any(|z| *z != [0.0; 2])
    }
}
