//! Writers: a value in, bytes out. They know no flags, paths, terminals or clocks.

pub mod record;
pub mod sheet;
pub mod step;
pub mod stl;
