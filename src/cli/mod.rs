//! The command line. It alone prints.
