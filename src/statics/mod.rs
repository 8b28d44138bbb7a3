//! Statics: effective gravity, settled surface, loads.
