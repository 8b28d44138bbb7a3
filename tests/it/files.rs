//! Saving and loading: the file is always whole, and what the system refuses is said in words.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::time::Duration;

use brimwright::app::{FileError, load, save_atomic};
use brimwright::scenario;
use brimwright::study::{Fill, Study, VerdictNote};

/// Set for the child process in which a test runs a writer.
const WRITER_TARGET: &str = "BRIMWRIGHT_TEST_WRITER_TARGET";

/// What the child says after its first save.
const SAVED_ONCE: &str = "saved once";

/// A study of some size; `mark` tells two of them apart.
fn study(mark: usize, n_notes: usize) -> Study {
    let text = r#"(version: 1, title: "t", liquid: (name: "w", density_kg_per_m3: 1000), fill: level_mm(1),
        width: constant(width_mm: 1), outline: [])"#;
    let mut study = scenario::parse(text.as_bytes()).expect("the text is good");
    study.title = format!("study {mark}");
    let note = VerdictNote { case: "c".into(), criterion: "k".into(), text: format!("{mark} ").repeat(40) };
    study.verdict_notes = vec![note; n_notes];
    study
}

fn names_in(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> =
        fs::read_dir(folder).unwrap().map(|e| e.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

/// The save fails with these words, and leaves the folder as it was.
#[track_caller]
fn check_refused(folder: &Path, path: &Path, words: &str) {
    let before = names_in(folder);
    let error = save_atomic(path, &study(2, 0)).expect_err("the save cannot work").to_string();
    assert!(error.contains(words), "wanted {words:?}, got {error:?}");
    assert!(error.contains(&path.display().to_string()), "{error:?} does not name the file");
    assert_eq!(names_in(folder), before, "something was left behind");
}

#[test]
fn what_is_saved_is_loaded() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("tank.ron");
    for mark in 0..3 {
        save_atomic(&path, &study(mark, 3)).unwrap();
        assert_eq!(load(&path).unwrap(), study(mark, 3));
    }
    assert_eq!(names_in(folder.path()), ["tank.ron"]);
}

#[test]
fn a_name_without_folder_is_saved_here() {
    // Tests run in the project's folder; the name is nobody else's.
    let path = Path::new("brimwright-test-of-a-bare-name.ron");
    let saved = save_atomic(path, &study(1, 0));
    let loaded = load(path);
    fs::remove_file(path).unwrap();
    saved.unwrap();
    assert_eq!(loaded.unwrap(), study(1, 0));
}

#[test]
fn refusals_say_what_to_do() {
    let folder = tempfile::tempdir().unwrap();
    let dir = folder.path();
    fs::create_dir(dir.join("sub")).unwrap();
    fs::write(dir.join("file"), "x").unwrap();
    check_refused(dir, &dir.join("sub"), "it is a folder; choose a file");
    check_refused(dir, &dir.join("none/tank.ron"), "no such folder; make it first");
    check_refused(dir, &dir.join("file/tank.ron"), "a part of its path is a file");
    check_refused(dir, Path::new("/"), "it is a folder");

    let error = load(&dir.join("none.ron")).unwrap_err().to_string();
    assert!(error.contains("no such file; check its name"), "{error}");
    let error = load(dir).unwrap_err().to_string();
    assert!(error.contains("it is a folder"), "{error}");
}

#[test]
fn a_study_that_could_not_be_read_again_is_not_saved() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("tank.ron");
    save_atomic(&path, &study(1, 0)).unwrap();
    let mut bad = study(2, 0);
    bad.fill = Fill::Level(f64::NAN);
    assert!(matches!(save_atomic(&path, &bad), Err(FileError::Unwritable { .. })));
    assert!(matches!(
        save_atomic(&path, &study(3, scenario::MAX_VERDICT_NOTES + 1)),
        Err(FileError::Unwritable { .. })
    ));
    assert_eq!(load(&path).unwrap(), study(1, 0), "the old file is as it was");
}

#[test]
fn a_faulty_file_is_refused_with_its_faults() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("tank.ron");
    fs::write(&path, "(version: 1,\n titel: \"t\")").unwrap();
    let error = load(&path).unwrap_err();
    assert!(matches!(&error, FileError::Unreadable { problems, .. } if problems.len() == 1), "{error:?}");
    let words = error.to_string();
    assert!(words.contains("line 2, column 2") && words.contains("`title`"), "{words}");
}

#[test]
fn a_huge_file_is_refused_unread() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("huge.ron");
    // A file with a hole: 100 GB long; reading it whole would not end.
    fs::File::create(&path).unwrap().set_len(100 << 30).unwrap();
    let error = load(&path).unwrap_err().to_string();
    assert!(error.contains("larger than 4 MiB"), "{error}");
}

#[cfg(unix)]
mod unix {
    use std::io::{BufRead, BufReader};
    use std::os::unix::fs::{MetadataExt, PermissionsExt, symlink};

    use super::*;

    #[test]
    fn permissions_and_owner_are_kept() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("tank.ron");
        save_atomic(&path, &study(1, 0)).unwrap();
        fs::set_permissions(&path, fs::Permissions::from_mode(0o640)).unwrap();
        // Only a privileged user may give the file away; others check that it stays theirs.
        let _ = std::os::unix::fs::chown(&path, Some(12345), Some(12345));
        let old = fs::metadata(&path).unwrap();
        save_atomic(&path, &study(2, 0)).unwrap();
        let new = fs::metadata(&path).unwrap();
        assert_eq!(new.permissions().mode() & 0o7777, 0o640);
        assert_eq!((new.uid(), new.gid()), (old.uid(), old.gid()));
        assert_ne!(new.ino(), old.ino(), "the file was replaced, not overwritten");
    }

    #[test]
    fn a_new_file_has_the_permissions_of_any_new_file() {
        let folder = tempfile::tempdir().unwrap();
        save_atomic(&folder.path().join("tank.ron"), &study(1, 0)).unwrap();
        fs::write(folder.path().join("plain"), "").unwrap();
        let mode = |name: &str| fs::metadata(folder.path().join(name)).unwrap().permissions().mode();
        assert_eq!(mode("tank.ron"), mode("plain"));
    }

    #[test]
    fn a_link_stays_a_link() {
        let folder = tempfile::tempdir().unwrap();
        let dir = folder.path();
        fs::create_dir(dir.join("store")).unwrap();
        symlink("store/real.ron", dir.join("one")).unwrap();
        symlink(dir.join("one"), dir.join("two")).unwrap();
        // First through a link to a file that is not there yet, then over it.
        for mark in [1, 2] {
            save_atomic(&dir.join("two"), &study(mark, 0)).unwrap();
            assert!(fs::symlink_metadata(dir.join("two")).unwrap().is_symlink());
            assert!(fs::symlink_metadata(dir.join("store/real.ron")).unwrap().is_file());
            assert_eq!(load(&dir.join("store/real.ron")).unwrap(), study(mark, 0));
        }
        assert_eq!(names_in(dir), ["one", "store", "two"]);
        assert_eq!(names_in(&dir.join("store")), ["real.ron"]);

        symlink("ring", dir.join("ring")).unwrap();
        check_refused(dir, &dir.join("ring"), "ring");
    }

    #[test]
    fn a_file_marked_read_only_is_left_alone() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("tank.ron");
        save_atomic(&path, &study(1, 0)).unwrap();
        fs::set_permissions(&path, fs::Permissions::from_mode(0o444)).unwrap();
        check_refused(folder.path(), &path, "it is read-only for you");
        assert_eq!(load(&path).unwrap(), study(1, 0));
    }

    #[test]
    fn a_device_is_never_replaced() {
        // As a privileged user a rename over it would succeed and take the device away.
        let error = save_atomic(Path::new("/dev/full"), &study(1, 0)).unwrap_err().to_string();
        assert!(error.contains("not a file"), "{error}");
        assert!(!fs::metadata("/dev/full").unwrap().is_file());
    }

    #[test]
    fn a_disk_without_room_leaves_the_old_file() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("tank.ron");
        save_atomic(&path, &study(1, 0)).unwrap();
        // A limit of one block for every file that the child writes stands for the full disk.
        let command = r#"trap "" XFSZ; ulimit -f 1; exec "$0" "$@""#;
        let mut shell = Command::new("sh");
        shell.args(["-c", command]).arg(std::env::current_exe().unwrap());
        let out = writer(&mut shell, &path).output().unwrap();
        let words = String::from_utf8_lossy(&out.stdout);
        assert!(words.contains("there is no room for it; free some space"), "{words}");
        assert_eq!(load(&path).unwrap(), study(1, 0));
        assert_eq!(names_in(folder.path()), ["tank.ron"], "no temporary file is left");
    }

    #[test]
    fn a_folder_that_takes_no_new_files_leaves_the_old_file() {
        // /proc takes no new files from anybody, a privileged user included.
        let error = save_atomic(Path::new("/proc/tank.ron"), &study(1, 0)).unwrap_err().to_string();
        assert!(error.starts_with("/proc/tank.ron cannot be saved: "), "{error}");
    }

    #[test]
    fn a_killed_writer_leaves_a_whole_file() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("tank.ron");
        save_atomic(&path, &study(0, 0)).unwrap();
        for round in 0..20_u64 {
            let mut child = writer(&mut Command::new(std::env::current_exe().unwrap()), &path)
                .stdout(Stdio::piped())
                .spawn()
                .unwrap();
            let mut lines = BufReader::new(child.stdout.take().unwrap()).lines();
            assert!(lines.any(|line| line.unwrap().ends_with(SAVED_ONCE)), "round {round}: the writer did not save");
            // At odd moments of a later save.
            std::thread::sleep(Duration::from_micros(round * 977));
            child.kill().unwrap();
            child.wait().unwrap();
            let study = load(&path).unwrap_or_else(|e| panic!("round {round}: {e}"));
            assert_ne!(study.title, "study 0", "round {round}");
        }
    }
}

/// The command, made to run only [`child_writer`] on `path`.
fn writer<'a>(command: &'a mut Command, path: &Path) -> &'a mut Command {
    command
        .args(["files::child_writer", "--exact", "--ignored", "--nocapture", "--test-threads=1"])
        .env(WRITER_TARGET, path)
        .stderr(Stdio::null())
}

/// Not a test of its own: saves over and over in a child process, until it is killed or a save fails.
#[test]
#[ignore = "run by other tests in a child process"]
fn child_writer() {
    let Some(path) = std::env::var_os(WRITER_TARGET).map(PathBuf::from) else { return };
    for mark in 1..5_000 {
        if let Err(error) = save_atomic(&path, &study(mark, 300)) {
            println!("{error}");
            return;
        }
        if mark == 1 {
            println!("{SAVED_ONCE}");
        }
    }
}
