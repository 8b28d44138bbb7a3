//! brimwright: sizing baffles and freeboard in accelerating tanks.
//!
//! The layers and their arrows are in DEVELOPERS.md and held by a test. The door is
//! [`study::Study::validate`], the facade [`analysis::run`].

pub mod analysis;
pub mod app;
pub mod cases;
pub mod cli;
pub mod criteria;
pub mod flow;
pub mod geom;
#[cfg(feature = "gui")]
pub mod gui;
pub mod liquid;
pub mod material;
pub mod num;
pub mod plates;
pub mod problem;
pub mod progress;
pub mod report;
pub mod scenario;
pub mod section;
pub mod sources;
pub mod statics;
pub mod study;
pub mod units;
