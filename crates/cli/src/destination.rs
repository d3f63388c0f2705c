//! Where results go: to standard output, or to a file that is there as a whole or not at all.

use std::{
    fs::{self, File},
    io::{self, BufWriter, IsTerminal, Stdout, Write},
    path::{Path, PathBuf},
    process,
    sync::{Mutex, MutexGuard, Once, PoisonError},
};

use tempfile::{NamedTempFile, TempPath};

/// Bytes that are written at once.
const BUFFER: usize = 1 << 16;
/// What a shell reports of a command ended by an interrupt: 128 and the number of the signal.
const INTERRUPTED: i32 = 130;

/// Where results go.
pub(crate) enum Destination {
    /// Standard output.
    Standard(BufWriter<Stdout>),
    /// A file in place of which nothing can be put: a device or a pipe.
    Through(BufWriter<File>, PathBuf),
    /// A file beside the one that is wanted, which takes its place in the end.
    Beside(Beside),
}

impl Destination {
    /// Standard output.
    pub(crate) fn standard() -> Self {
        Self::Standard(BufWriter::with_capacity(BUFFER, io::stdout()))
    }

    /// A file. If there is one, it stays as it is until [`Destination::finish`].
    pub(crate) fn file(path: &Path) -> io::Result<Self> {
        let special = fs::metadata(path).is_ok_and(|there| !there.is_file());
        if special {
            let file = File::options().write(true).open(path)?;
            let writer = BufWriter::with_capacity(BUFFER, file);
            return Ok(Self::Through(writer, path.to_owned()));
        }
        Ok(Self::Beside(Beside::new(path)?))
    }

    /// What it is called.
    pub(crate) fn name(&self) -> String {
        match self {
            Self::Standard(_) => "standard output".to_owned(),
            Self::Through(_, path) | Self::Beside(Beside { path, .. }) => {
                path.display().to_string()
            }
        }
    }

    /// Whether it is a terminal.
    pub(crate) fn is_terminal(&self) -> bool {
        match self {
            Self::Standard(out) => out.get_ref().is_terminal(),
            Self::Through(file, _) => file.get_ref().is_terminal(),
            Self::Beside(_) => false,
        }
    }

    /// Writes out what is buffered, and puts a file in its place.
    pub(crate) fn finish(&mut self) -> io::Result<()> {
        self.flush()?;
        match self {
            Self::Beside(beside) => beside.put_in_place(),
            Self::Standard(_) | Self::Through(..) => Ok(()),
        }
    }
}

impl Write for Destination {
    fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
        match self {
            Self::Standard(out) => out.write(bytes),
            Self::Through(file, _) => file.write(bytes),
            Self::Beside(beside) => beside.file.write(bytes),
        }
    }

    fn flush(&mut self) -> io::Result<()> {
        match self {
            Self::Standard(out) => out.flush(),
            Self::Through(file, _) => file.flush(),
            Self::Beside(beside) => beside.file.flush(),
        }
    }
}

/// A file under way. Where it is dropped before it was put in its place, it is removed.
pub(crate) struct Beside {
    file: BufWriter<File>,
    own: Option<TempPath>,
    /// Where it belongs.
    path: PathBuf,
}

impl Beside {
    fn new(path: &Path) -> io::Result<Self> {
        remove_when_interrupted()?;
        // Behind a link is the file that is meant.
        let path = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
        let folder = match path.parent() {
            Some(folder) if folder != Path::new("") => folder,
            _ => Path::new("."),
        };
        let mut under_way = under_way();
        let (file, own) = create(folder)?.into_parts();
        under_way.push(own.to_path_buf());
        Ok(Self {
            file: BufWriter::with_capacity(BUFFER, file),
            own: Some(own),
            path,
        })
    }

    fn put_in_place(&mut self) -> io::Result<()> {
        // On the disk first, so that not even a machine that stops leaves a part under the name.
        self.file.get_ref().sync_all()?;
        let mut under_way = under_way();
        let Some(own) = self.own.take() else {
            return Ok(());
        };
        under_way.retain(|path| *path != *own);
        own.persist(&self.path).map_err(|error| error.error)
    }
}

#[cfg(unix)]
fn create(folder: &Path) -> io::Result<NamedTempFile> {
    use std::os::unix::fs::PermissionsExt as _;

    // Those of any new file; the mask of the user is taken off.
    let permissions = fs::Permissions::from_mode(0o666);
    let mut builder = tempfile::Builder::new();
    builder.prefix(".molkin-").permissions(permissions);
    builder.tempfile_in(folder)
}

#[cfg(not(unix))]
fn create(folder: &Path) -> io::Result<NamedTempFile> {
    tempfile::Builder::new()
        .prefix(".molkin-")
        .tempfile_in(folder)
}

/// Files that are under way. Whoever makes one or puts one in its place holds this.
static UNDER_WAY: Mutex<Vec<PathBuf>> = Mutex::new(Vec::new());

fn under_way() -> MutexGuard<'static, Vec<PathBuf>> {
    UNDER_WAY.lock().unwrap_or_else(PoisonError::into_inner)
}

/// From here on, Ctrl-C and being asked to end remove the files that are under way.
fn remove_when_interrupted() -> io::Result<()> {
    static ONCE: Once = Once::new();
    let mut outcome = Ok(());
    ONCE.call_once(|| {
        outcome = ctrlc::set_handler(|| {
            // Held until the end, so that no other file comes to be.
            let under_way = under_way();
            for path in under_way.iter() {
                // It may be gone already, and there is nobody to tell.
                let _ = fs::remove_file(path);
            }
            process::exit(INTERRUPTED);
        });
    });
    outcome.map_err(io::Error::other)
}
