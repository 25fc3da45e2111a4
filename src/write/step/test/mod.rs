//! Tests of the STEP writer.

mod conformance;
mod content;
mod fixture;
mod outside;
mod reader;
mod schema;
mod text;
