//! The program: parse, run, exit.

use std::process::ExitCode;

fn main() -> ExitCode {
    nonius::command::main()
}
