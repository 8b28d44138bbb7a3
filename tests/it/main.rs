//! The integration tests: one binary, one module a subject.

mod bad_sections;
mod clipper;
mod degenerate;
mod properties;
mod properties_loads;
mod published_forces;
mod published_rigid;
mod published_sections;
mod reference;
mod support;
