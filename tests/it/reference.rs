//! The reference tables themselves: every row says where it comes from, how it is known and how near is near.

use std::collections::BTreeSet;

use crate::support::table::{Table, directory, table};

const STATUS_WORDS: [&str; 5] = ["COMPUTED", "SEEN", "SEEN+COMPUTED", "MEMORY", "MEMORY+COMPUTED"];

fn tables() -> Vec<Table> {
    let entries = std::fs::read_dir(directory()).expect("tests/reference");
    let mut names: Vec<String> = entries
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .filter(|n| n.ends_with(".csv"))
        .collect();
    names.sort();
    names.iter().map(|name| table(name)).collect()
}

#[test]
fn every_row_has_a_tolerance_a_source_and_a_status() {
    let tables = tables();
    assert!(tables.len() >= 16, "{} tables", tables.len());
    for table in &tables {
        for row in &table.rows {
            let context = format!("{}, {}", table.file_name, row.id());
            row.tolerance();
            assert!(row.text("source").len() > 3, "{context}: source");
            let status = row.text("status");
            assert!(STATUS_WORDS.contains(&status), "{context}: status `{status}`");
        }
    }
}

#[test]
fn every_row_has_its_own_id() {
    for table in tables().iter().filter(|t| !t.columns.iter().any(|c| c == "column")) {
        let ids: BTreeSet<&str> = table.rows.iter().map(|row| row.id()).collect();
        assert_eq!(ids.len(), table.rows.len(), "{}: ids used twice", table.file_name);
    }
}

#[test]
fn every_table_is_read_by_a_test() {
    let tests = [
        include_str!("published_rigid.rs"),
        include_str!("published_sections.rs"),
        include_str!("published_forces.rs"),
        include_str!("published_panels.rs"),
    ];
    for table in tables() {
        let quoted = format!("\"{}\"", table.file_name);
        assert!(tests.iter().any(|text| text.contains(&quoted)), "{}: no test reads it", table.file_name);
    }
}
