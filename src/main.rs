//! The command line of doorglow; everything happens in the library.

fn main() -> std::process::ExitCode {
    doorglow::cli::main()
}
