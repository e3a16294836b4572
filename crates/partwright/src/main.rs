//! The `partwright` binary: a thin shell around `partwright_cli`.

use std::process::ExitCode;

fn main() -> ExitCode {
    partwright_cli::main()
}
