//! The help of each command opens with an example, and the example runs.

use assert_cmd::Command;

fn wattsieve(words: &[&str]) -> (Option<i32>, String) {
    let folder = tempfile::tempdir().expect("a folder");
    let mut command = Command::cargo_bin("wattsieve").expect("the binary");
    let output = command.args(words).current_dir(folder.path()).output().expect("a run");
    (output.status.code(), String::from_utf8_lossy(&output.stdout).into_owned())
}

/// The names that the list of commands gives, but for `help` itself.
fn commands() -> Vec<String> {
    let (_, help) = wattsieve(&["--help"]);
    let list = help.split("Commands:\n").nth(1).and_then(|rest| rest.split("\n\n").next()).expect("a list").to_owned();
    let names = list.lines().filter_map(|line| line.strip_prefix("  ")).filter(|line| !line.starts_with(' '));
    names.filter_map(|line| line.split(' ').next()).filter(|name| *name != "help").map(str::to_owned).collect()
}

#[test]
fn the_help_of_each_command_opens_with_an_example_that_runs() {
    let commands = commands();
    assert!(commands.len() >= 5, "{commands:?}");
    for command in commands {
        for flag in ["-h", "--help"] {
            let (_, help) = wattsieve(&[&command, flag]);
            let example = help.lines().next().and_then(|line| line.strip_prefix("Example: wattsieve "));
            let words: Vec<&str> = example.unwrap_or_else(|| panic!("{command}: {help}")).split(' ').collect();
            assert_eq!(words[0], command);
            assert_eq!(wattsieve(&words).0, Some(0), "{words:?}");
        }
    }
}

#[test]
fn what_cannot_be_asked_for_is_refused() {
    for words in [
        ["shortlist", "--threads", "1025"].as_slice(),
        &["shortlist", "--top", "0"],
        &["account", "--rank", "2", "--stage", "-"],
        &["account", "--rank", "2", "--parts", "high=x", "--frequency", "1 Hz"],
    ] {
        assert_eq!(wattsieve(words), (Some(2), String::new()), "{words:?}");
    }
}
