//! A hand calculation as data: steps, each with its rule and a table of this frame's numbers.

/// What the numbers of a worksheet column are.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Amount {
    /// A name: text.
    Name,
    /// A number without unit.
    Ratio,
    /// m.
    Length,
    /// N.
    Force,
    /// N m.
    Moment,
    /// m2.
    Area,
    /// 1/m.
    PerLength,
    /// Stiffness of a member end against rotation, N m.
    Stiffness,
    /// Stiffness of a storey against drift, N/m.
    StoreyStiffness,
    /// Stiffness of the whole frame against bending, N m2.
    BendingStiffness,
    /// rad.
    Rotation,
    /// A drift or sway, m.
    Movement,
}

/// One column of a step's table.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SheetColumn {
    /// Head of the column, without unit.
    pub head: String,
    /// What its numbers are.
    pub amount: Amount,
}

/// One entry of a step's table.
#[derive(Debug, Clone, PartialEq)]
pub enum SheetCell {
    /// A name.
    Name(String),
    /// A number in N, m.
    Number(f64),
    /// Nothing.
    Blank,
}

/// One step of a hand calculation.
#[derive(Debug, Clone, PartialEq)]
pub struct Step {
    /// What the step finds.
    pub title: String,
    /// The rule in words and symbols.
    pub rule: String,
    /// The table's columns.
    pub columns: Vec<SheetColumn>,
    /// The table's rows, one entry per column.
    pub rows: Vec<Vec<SheetCell>>,
}

/// A method's hand calculation for one frame.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Worksheet {
    /// The steps in the order a person would take them.
    pub steps: Vec<Step>,
}
