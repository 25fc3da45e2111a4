//! The command line of spanwise.

fn main() {}
