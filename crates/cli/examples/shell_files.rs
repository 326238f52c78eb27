//! Writes the manual pages and the completions of shells: `cargo run -p crestline-cli --example shell_files -- FOLDER`.

use std::io::{self, Error};
use std::path::PathBuf;

use clap_complete::Shell;

fn main() -> io::Result<()> {
    let folder =
        std::env::args_os().nth(1).map(PathBuf::from).ok_or_else(|| Error::other("which folder?"))?;
    std::fs::create_dir_all(&folder)?;
    clap_mangen::generate_to(crestline_cli::description(), &folder)?;
    let mut command = crestline_cli::description();
    for shell in [Shell::Bash, Shell::Zsh, Shell::Fish, Shell::PowerShell] {
        clap_complete::generate_to(shell, &mut command, "crestline", &folder)?;
    }
    Ok(())
}
