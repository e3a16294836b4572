//! The bare server, for trying it without the program around it.

fn main() -> std::process::ExitCode {
    partwright_server::serve()
}
