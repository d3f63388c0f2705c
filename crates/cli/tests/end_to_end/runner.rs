//! Runs the program in a folder of its own.

use std::{
    fs,
    io::Write,
    path::{Path, PathBuf},
    process::{Command, Stdio},
};

/// A scratch folder, emptied when it is asked for.
pub(crate) struct Folder(PathBuf);

impl Folder {
    /// A folder for the test of this name.
    pub(crate) fn new(test: &str) -> Self {
        let path = Path::new(env!("CARGO_TARGET_TMPDIR")).join(test);
        if path.exists() {
            fs::remove_dir_all(&path).unwrap();
        }
        fs::create_dir_all(&path).unwrap();
        Self(path)
    }

    /// Writes a file into it.
    pub(crate) fn with(self, name: &str, text: impl AsRef<[u8]>) -> Self {
        fs::write(self.0.join(name), text).unwrap();
        self
    }

    /// Where it is.
    pub(crate) fn path(&self) -> &Path {
        &self.0
    }

    /// Runs the program there.
    pub(crate) fn run(&self, arguments: &[&str]) -> Outcome {
        run_in(&self.0, arguments, "")
    }
}

/// What a run left behind.
#[derive(Debug)]
pub(crate) struct Outcome {
    pub(crate) status: i32,
    pub(crate) out: String,
    pub(crate) words: String,
}

/// The program, in a folder, with an environment that tests need not reckon with.
pub(crate) fn program(folder: &Path, arguments: &[&str]) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_molkin"));
    command
        .args(arguments)
        .current_dir(folder)
        .env_remove("NO_COLOR")
        .env("TERM", "xterm")
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped());
    command
}

fn run_in(folder: &Path, arguments: &[&str], input: &str) -> Outcome {
    let mut child = program(folder, arguments).spawn().unwrap();
    let mut stdin = child.stdin.take().unwrap();
    // The program may end without reading.
    let _ = stdin.write_all(input.as_bytes());
    drop(stdin);
    let output = child.wait_with_output().unwrap();
    Outcome {
        status: output.status.code().unwrap(),
        out: String::from_utf8(output.stdout).unwrap(),
        words: String::from_utf8(output.stderr).unwrap(),
    }
}

/// The top of the repository.
pub(crate) fn repository() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../..")
}

/// Runs the program in the demo folder.
pub(crate) fn demo(arguments: &[&str]) -> Outcome {
    run_in(&repository().join("fixtures/demo"), arguments, "")
}

/// Runs the program with a text on standard input.
pub(crate) fn with_input(arguments: &[&str], input: &str) -> Outcome {
    run_in(&repository(), arguments, input)
}

/// Runs the program.
pub(crate) fn run(arguments: &[&str]) -> Outcome {
    with_input(arguments, "")
}
