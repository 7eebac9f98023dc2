//! Prints the JSON Schema of requests, replies and faults: `cargo run -p dewledger-desk --example schema > docs/desk.schema.json`.

use std::io::Write;

fn main() -> std::io::Result<()> {
    std::io::stdout().write_all(dewledger_desk::schema().as_bytes())
}
