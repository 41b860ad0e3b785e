//! Where a result is written to, and what stays as it was.
#![cfg(unix)]

use std::fs;
use std::os::unix::fs::{FileTypeExt, PermissionsExt, symlink};
use std::path::Path;
use std::process::Output;

use assert_cmd::Command;

fn rail_to(path: &Path) -> Output {
    let mut command = Command::cargo_bin("wattsieve").expect("the binary");
    command.arg("rail").arg("--out").arg(path).output().expect("a run")
}

#[test]
fn a_pipe_is_written_to_and_stays_a_pipe() {
    let folder = tempfile::tempdir().expect("a folder");
    let pipe = folder.path().join("pipe");
    assert!(std::process::Command::new("mkfifo").arg(&pipe).status().expect("a pipe").success());
    let reader = std::thread::spawn({
        let pipe = pipe.clone();
        move || fs::read_to_string(pipe)
    });
    let output = rail_to(&pipe);
    let kind = fs::metadata(&pipe).expect("a pipe").file_type();
    assert!(kind.is_fifo(), "{kind:?}");
    assert_eq!(output.status.code(), Some(0));
    assert!(reader.join().expect("a reader").expect("text").contains("output.voltage"));
}

#[test]
fn a_link_keeps_pointing_at_the_file_that_is_written() {
    let folder = tempfile::tempdir().expect("a folder");
    let (file, link) = (folder.path().join("file"), folder.path().join("link"));
    fs::write(&file, "old").expect("written");
    symlink("file", &link).expect("a link");
    assert_eq!(rail_to(&link).status.code(), Some(0));
    assert!(link.is_symlink());
    assert!(fs::read_to_string(&file).expect("text").contains("output.voltage"));
}

#[test]
fn a_file_keeps_its_permissions_and_a_new_one_gets_the_usual() {
    let folder = tempfile::tempdir().expect("a folder");
    let mode = |path: &Path| fs::metadata(path).expect("a file").permissions().mode() & 0o777;
    let (old, new, usual) = (folder.path().join("old"), folder.path().join("new"), folder.path().join("usual"));
    fs::write(&old, "").expect("written");
    fs::set_permissions(&old, fs::Permissions::from_mode(0o640)).expect("set");
    fs::write(&usual, "").expect("written");
    assert_eq!(rail_to(&old).status.code(), Some(0));
    assert_eq!(rail_to(&new).status.code(), Some(0));
    assert_eq!(mode(&old), 0o640);
    assert_eq!(mode(&new), mode(&usual));
    assert_eq!(fs::read_dir(folder.path()).expect("a folder").count(), 3);
}

#[test]
fn a_folder_that_is_not_there_is_named_as_the_user_named_it() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("none/list");
    let output = rail_to(&path);
    let wanted = format!("error: cannot write {}: No such file or directory (os error 2)\n", path.display());
    assert_eq!(String::from_utf8_lossy(&output.stderr), wanted);
    assert_eq!(output.status.code(), Some(2));
}
