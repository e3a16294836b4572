pub(crate) fn run() -> Result<(), String> {
    Ok(())
}
