//! Writers: a value in, bytes out. They know no flags, paths, terminals or clocks.

pub mod drawing;
pub mod lettering;
pub mod markup;
pub mod picture;
pub mod record;
pub mod report;
pub mod section_record;
mod section_svg;
pub mod sheet;
pub mod step;
pub mod stl;

pub use section_svg::{SectionDrawing, Tooth, section_svg};
