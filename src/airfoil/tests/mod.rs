//! Tests of sections as a whole.

mod changes;
mod figures;
mod fits;
mod random;
mod smoothness;
mod tables;
