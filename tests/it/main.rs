//! The integration tests: one binary, one module a subject.

mod any_plates;
mod arbitrary;
mod bad_plates;
mod bad_sections;
#[cfg(feature = "gui")]
mod board;
mod brims;
mod cli;
mod clipper;
mod degenerate;
mod edits;
mod envelope;
mod examples;
mod files;
mod fill_map;
mod gas_pockets;
#[cfg(feature = "gui")]
mod gui;
mod json;
mod layout_rules;
mod panels;
mod partitions;
mod plate_strength;
mod pools_by_hand;
mod pools_sampled;
mod program;
mod properties;
mod properties_flow;
mod properties_loads;
mod published_flow;
mod published_forces;
mod published_panels;
mod published_rigid;
mod published_sections;
mod reference;
mod report;
mod scenario;
mod support;
mod sweep;
mod tidy;
mod transfer;
