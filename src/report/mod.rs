//! Results for readers: the JSON contract and the tables of the command line.
