//! Watching the process that started the server: without it there is nobody to serve.
//!
//! The end of the input tells the same, as long as no other process holds the pipe open.

use std::sync::Arc;
use std::time::Duration;

use crate::session::Session;

/// How often to look.
const INTERVAL: Duration = Duration::from_secs(2);

/// Ends the process when the client's ends, if that can be seen from here: only where `/proc`
/// shows it among our own ancestors. Any other number may be one of another machine or
/// container, where it means a process that has nothing to do with us.
pub(crate) fn watch(id: u32, session: &Arc<Session>) {
    let Some(born) = birth(id).filter(|_| is_ancestor(id)) else {
        return;
    };
    let session = Arc::clone(session);
    let look = move || {
        while birth(id).as_ref() == Some(&born) {
            std::thread::sleep(INTERVAL);
        }
        session.end_process()
    };
    // Without the thread the end of the input still ends the server.
    let _ = std::thread::Builder::new()
        .name("parent".to_owned())
        .spawn(look);
}

/// The fields of `/proc/ID/stat` behind the command's name (proc(5)): state, parent, ….
fn fields(id: u32) -> Option<Vec<String>> {
    let stat = std::fs::read_to_string(format!("/proc/{id}/stat")).ok()?;
    // The name is in parentheses and may hold anything, parentheses too.
    let (_, fields) = stat.rsplit_once(')')?;
    Some(fields.split_whitespace().map(str::to_owned).collect())
}

/// When a process that lives was started: with its number this names it, as numbers are used
/// again.
fn birth(id: u32) -> Option<String> {
    let fields = fields(id)?;
    let gone = matches!(fields.first()?.as_str(), "Z" | "X" | "x");
    // The start time is field 22 of the line, the state field 3.
    fields.get(19).filter(|_| !gone).cloned()
}

fn is_ancestor(id: u32) -> bool {
    let mut at = std::process::id();
    // A process tree is not that deep; the bound guards against a ring.
    for _ in 0..1000 {
        let parent = fields(at).and_then(|f| f.get(1)?.parse().ok());
        match parent {
            Some(parent) if parent == id => return true,
            Some(parent) if parent != 0 => at = parent,
            _ => return false,
        }
    }
    false
}

#[cfg(all(test, target_os = "linux"))]
mod tests {
    use super::*;

    #[test]
    fn living_processes_are_told_apart() {
        assert!(birth(std::process::id()).is_some());
        assert!(birth(u32::MAX).is_none());
        assert!(!is_ancestor(std::process::id()));
        assert!(is_ancestor(std::os::unix::process::parent_id()));
    }
}
