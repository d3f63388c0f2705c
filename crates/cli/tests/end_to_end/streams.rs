//! Standard output and standard error.

use std::io::Read;

use rstest::rstest;

use crate::runner::{Folder, demo, program, repository, run};

#[test]
fn no_colour_where_no_terminal_is() {
    let outcome = demo(&["compare", "label.mol", "arrived.mol"]);
    assert!(!outcome.out.contains('\x1b'));
}

#[test]
fn the_caution_ends_the_text() {
    let text = run(&["compare", "CCO", "COC"]);
    assert!(text.out.ends_with("a qualified chemist decide.\n"));
    assert_eq!(text.words, "");
    let json = run(&["compare", "CCO", "COC", "--format", "json"]);
    assert!(!json.out.contains("qualified"));
    assert!(json.words.ends_with("a qualified chemist decide.\n"));
}

#[test]
fn names_cannot_steer_a_terminal() {
    let outcome = run(&["compare", "C \x1b[31mred", "C"]);
    assert!(outcome.out.contains("\u{fffd}[31mred"));
}

/// Whoever reads may stop. What was found up to there counts.
#[rstest]
#[case::identical("C\n", &["compare", "C", "many.smi", "--brief"], 0)]
#[case::different("CC\n", &["compare", "C", "many.smi", "--brief", "--threads", "3"], 1)]
#[case::alone("CC\n", &["compare", "C", "many.smi", "--brief", "--threads", "1"], 1)]
#[case::keys("C\n", &["keys", "many.smi", "--threads", "3"], 0)]
#[case::describe("C\n", &["describe", "many.smi", "--threads", "3"], 0)]
fn a_closed_pipe_is_no_trouble(
    #[case] line: &str,
    #[case] arguments: &[&str],
    #[case] expected: i32,
) {
    let name = format!("closed_pipe_{}", arguments.join("_").replace(' ', ""));
    let folder = Folder::new(&name).with("many.smi", line.repeat(20_000));
    let mut child = program(folder.path(), arguments).spawn().unwrap();
    drop(child.stdin.take());
    let mut out = child.stdout.take().unwrap();
    out.read_exact(&mut [0; 100]).unwrap();
    drop(out);
    let output = child.wait_with_output().unwrap();
    assert_eq!(output.status.code(), Some(expected));
    assert_eq!(String::from_utf8(output.stderr).unwrap(), "");
}

#[cfg(target_os = "linux")]
#[test]
fn a_full_disk_is_trouble() {
    let full = std::fs::File::options()
        .write(true)
        .open("/dev/full")
        .unwrap();
    let mut command = program(&repository(), &["compare", "C", "C"]);
    let output = command.stdout(full).output().unwrap();
    assert_eq!(output.status.code(), Some(2));
    let words = String::from_utf8(output.stderr).unwrap();
    assert!(words.starts_with("molkin: standard output: "), "{words}");
}
