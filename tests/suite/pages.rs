//! What the pages say about the repository is so.

use molkin_tests::{Tally, read_text, workspace};

/// Every path on docs/architecture.md that stands as code and begins with a folder of the
/// repository.
#[test]
fn paths_of_the_architecture_page_exist() {
    const FOLDERS: [&str; 4] = ["crates/", "tests/", "fixtures/", "docs/"];
    let page = read_text(&workspace("docs/architecture.md"));
    let mut tally = Tally::new("paths");
    // Code stands between single backquotes: every second piece.
    for code in page.split('`').skip(1).step_by(2) {
        if FOLDERS.iter().any(|folder| code.starts_with(folder)) {
            tally.case(workspace(code).exists(), || format!("{code} is not there"));
        }
    }
    tally.finish(20);
}
