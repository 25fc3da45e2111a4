//! spanwise turns the numbers of a wing into an exact solid and shows that the solid has those numbers.
//!
//! # Conventions
//!
//! - Axes: x aft, y to starboard, z up, right-handed. Origin: the leading edge of the reference root chord, on the
//!   centreline, before the root section is turned to its incidence.
//! - Geometry is in millimetres (the kernel's absolute tolerance of 1e-6 is then one nanometre). Angles are degrees
//!   in the spec and in reports, radians inside.
//! - Signs: sweep + aft, dihedral + up, twist + leading edge up (washout is negative), incidence + leading edge up.
//! - Chord: true length of the section's chord line. Sweep and reference area: in plan view (projected on z = 0).
//! - Twist and incidence turn a section about its own point at the twist axis (fraction of the chord).
//! - Lines of constant chord fraction on a ruled panel are straight (straight elements).
//! - A section stands upright (parallel to the plane of symmetry) where its panels' dihedral is at most 30°. Steeper
//!   panels carry their sections square to themselves; where such a panel meets another, the section lies in the plane
//!   that bisects the two and is thickened by 1/cos of half the angle between them, a mitre.

#![warn(clippy::print_stdout, clippy::print_stderr)]

pub mod spec;

pub mod spline;

pub mod airfoil;

pub mod planform;

pub mod loft;

pub mod solid;

pub mod mesh;

pub mod measure;

pub mod write;

pub mod inspect;

pub mod wing;

pub mod family;

pub mod cli;
