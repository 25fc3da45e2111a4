//! What a spec says about the STEP file.

/// How the STEP file is written.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct StepForm {
    /// How reference lines and points are written.
    pub reference: StepReference,
    /// The application protocol.
    pub schema: StepSchema,
}

/// How the reference lines and points stand in the STEP file.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum StepReference {
    /// As construction geometry and as a wireframe (default).
    #[default]
    Both,
    /// As construction geometry only.
    Construction,
    /// As a wireframe beside the solid.
    Wireframe,
    /// As parts of an assembly, one a line.
    Parts,
    /// Not at all.
    None,
}

/// The application protocol of the STEP file.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum StepSchema {
    /// ISO 10303-242 (default).
    #[default]
    Ap242,
    /// ISO 10303-214, for older readers.
    Ap214,
}
