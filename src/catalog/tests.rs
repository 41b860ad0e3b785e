use super::*;
use crate::demo;
use crate::fault::Severity;

fn demo_files() -> Vec<(&'static str, &'static [u8])> {
    demo::CATALOGS.iter().map(|(name, text)| (*name, text.as_bytes())).collect()
}

/// The demo with one of its files replaced.
fn with(name: &'static str, bytes: &'static [u8]) -> Vec<(&'static str, &'static [u8])> {
    demo_files().into_iter().filter(|(file, _)| *file != name).chain([(name, bytes)]).collect()
}

#[test]
fn the_demo_is_without_fault() {
    let read = read_texts(demo_files(), ReadOptions { keep_rows: true, ..ReadOptions::default() });
    assert_eq!(read.faults.render(false), "");
    for (catalog, parts) in Catalog::ALL.into_iter().zip([
        read.parts.switches.len(),
        read.parts.diodes.len(),
        read.parts.inductors.len(),
        read.parts.capacitors.len(),
    ]) {
        assert!(parts >= 12, "{}", catalog.name());
        assert_eq!(read.rows.of(catalog).rows.len(), parts);
    }
    let first = &read.parts.switches[0];
    assert_eq!(read.rows.switches.cell(0, "part"), Some(first.identity.part.as_str()));
    let cell = read.rows.switches.cell(0, "on_resistance [mΩ] @ 4.5 V").map(|cell| format!("{cell}e-3"));
    let value = first.on_resistance_ohm.points().iter().find(|(gate_v, _)| *gate_v == 4.5).map(|(_, ohm)| *ohm);
    assert_eq!(cell.and_then(|cell| cell.parse().ok()), value);
}

const DIODES: &[u8] = b"part,voltage_rating [V],current_rating [A],forward_drop [mV] @ 1 A,thermal_resistance [K/W]\n\
    d1,40,3,400,50\nd2,40,x,400,50\nd3,40,3,y,-1\n";

#[test]
fn bad_rows_stop_the_run_or_are_left_out() {
    let stopped = read_texts(with("diodes.csv", DIODES), ReadOptions::default());
    assert_eq!(stopped.faults.count(Severity::Error), 3);
    assert_eq!(stopped.skipped, 0);
    let skipping = ReadOptions { skip_bad: true, keep_rows: true };
    let skipped = read_texts(with("diodes.csv", DIODES), skipping);
    assert!(!skipped.faults.has_errors());
    assert_eq!((skipped.faults.count(Severity::Warning), skipped.skipped), (3, 2));
    assert_eq!(skipped.parts.diodes.len(), 1);
    assert_eq!(skipped.rows.diodes.rows[0].line, 2);
}

#[test]
fn a_missing_catalog_is_an_error_but_for_diodes() {
    let without = |name: &str| demo_files().into_iter().filter(|(file, _)| *file != name).collect::<Vec<_>>();
    assert!(read_texts(without("inductors.csv"), ReadOptions::default()).faults.has_errors());
    let read = read_texts(without("diodes.csv"), ReadOptions::default());
    assert!(!read.faults.has_errors() && !read.faults.is_empty());
    assert!(read.parts.diodes.is_empty());
}

#[test]
fn rows_that_turn_out_ambiguous_are_left_out_with_the_bad_ones() {
    const TEXT: &[u8] =
        b"part;voltage_rating [V];current_rating [A];forward_drop [mV] @ 1 A;thermal_resistance [K/W]\n\
        d1;40;3;1.234;50\nd2;40;3,5;400;50\n";
    let read = read_texts(with("diodes.csv", TEXT), ReadOptions { skip_bad: true, keep_rows: true });
    assert_eq!((read.parts.diodes.len(), read.skipped, read.rows.diodes.rows.len()), (1, 1, 1));
    assert_eq!(read.parts.diodes[0].identity.part, "d2");
    assert!(read_texts(with("diodes.csv", TEXT), ReadOptions::default()).faults.has_errors());
}

#[test]
fn a_folder_that_is_not_there_is_said_to_be_missing() {
    let read = read_folder(std::path::Path::new("no/such/folder"), ReadOptions::default());
    assert!(read.faults.render(false).starts_with("no/such/folder: error: the folder of catalogs cannot be read"));
    assert!(!read.machine_failed);
}

#[test]
fn endless_files_are_refused_and_not_read_to_their_end() {
    for (byte, said) in
        [(b'x', "longer than a mebibyte"), (b',', "more than 4096 cells"), (b'"', "longer than a mebibyte")]
    {
        let outcome = for_each_part::<crate::part::Diode>("endless", std::io::repeat(byte), |_, _| {});
        let faults = outcome.file_faults.render(false);
        assert!(faults.contains(said), "{faults}");
    }
}

#[cfg(unix)]
#[test]
fn a_folder_may_have_a_name_that_is_no_text() {
    use std::os::unix::ffi::OsStrExt;

    let root = tempfile::tempdir().expect("a folder of our own");
    let folder = root.path().join(std::ffi::OsStr::from_bytes(b"caf\xe9"));
    std::fs::create_dir(&folder).expect("a folder in it");
    for (name, text) in demo::CATALOGS {
        std::fs::write(folder.join(name), text).expect("a catalog in it");
    }
    let read = read_folder(&folder, ReadOptions::default());
    assert_eq!(read.faults.render(false), "");
    assert!(!read.parts.switches.is_empty());
    std::fs::write(folder.join("diodes.csv"), "part\n").expect("a catalog in it");
    let faults = read_folder(&folder, ReadOptions::default()).faults.render(false);
    assert!(faults.contains("caf\u{fffd}"), "{faults}");
}
