//! Taking the input apart into messages (LSP 3.17, "Base Protocol").
//!
//! The library's own reader gives up at the first message it cannot decode, and with it the
//! whole server; this one reports the message and goes on with the next.

use std::io::{BufRead, Read};

/// The largest message that is taken in; a larger one is read over.
const LARGEST: u64 = 256 << 20;
/// The longest line of a header that is looked at as one.
const LONGEST_LINE: u64 = 8 << 10;

/// What comes next.
#[derive(Debug, PartialEq, Eq)]
pub(crate) enum Frame {
    /// A message.
    Body(Vec<u8>),
    /// Something that is none, and why.
    Broken(String),
    /// The input has ended.
    End,
}

/// The messages of an input.
pub(crate) struct Frames<R> {
    input: R,
}

impl<R: BufRead> Frames<R> {
    /// The messages of that input.
    pub(crate) fn new(input: R) -> Frames<R> {
        Frames { input }
    }

    /// Waits for what comes next.
    pub(crate) fn next(&mut self) -> Frame {
        let mut length = None;
        let (mut odd, mut refused) = (None, None);
        let mut empty = true;
        loop {
            let Some(line) = self.line() else {
                return Frame::End;
            };
            if line.is_empty() {
                match length {
                    Some(length) => return self.body(length, refused),
                    // Blank lines between messages do no harm.
                    None if empty => continue,
                    None => {
                        let why =
                            odd.unwrap_or_else(|| "a header has no Content-Length".to_owned());
                        return Frame::Broken(why);
                    }
                }
            }
            empty = false;
            match header(&line) {
                Header::Length(bytes) => length = Some(bytes),
                Header::Other => {}
                Header::Odd(why) => odd = Some(why),
                Header::Refused(why) => refused = Some(why),
            }
        }
    }

    /// The next line without its end; `None` at the end of the input.
    fn line(&mut self) -> Option<String> {
        let mut line = Vec::new();
        let read = (&mut self.input)
            .take(LONGEST_LINE)
            .read_until(b'\n', &mut line);
        if !matches!(read, Ok(1..)) {
            return None;
        }
        Some(
            String::from_utf8_lossy(&line)
                .trim_end_matches(['\r', '\n'])
                .to_owned(),
        )
    }

    fn body(&mut self, length: u64, refused: Option<String>) -> Frame {
        let mut input = (&mut self.input).take(length);
        if length > LARGEST {
            let _ = std::io::copy(&mut input, &mut std::io::sink());
            return Frame::Broken(format!("a message of {length} bytes is too long"));
        }
        let mut body = Vec::new();
        match input.read_to_end(&mut body) {
            Ok(read) if read as u64 == length => refused.map_or(Frame::Body(body), Frame::Broken),
            _ => Frame::End,
        }
    }
}

enum Header {
    Length(u64),
    Other,
    /// Not a header line; it matters only where no length follows.
    Odd(String),
    /// Its message cannot be read.
    Refused(String),
}

/// Reads one header line. What stands in front of a `Content-Length` is a remainder of something
/// broken, and passed over, so that the message itself is not lost.
fn header(line: &str) -> Header {
    let lower = line.to_ascii_lowercase();
    if let Some((_, value)) = lower.rsplit_once("content-length:") {
        return match value.trim().parse() {
            Ok(bytes) => Header::Length(bytes),
            Err(_) => Header::Odd(format!("{value:?} is no length of a message")),
        };
    }
    match lower.split_once(':') {
        Some(("content-type", value)) => match value.split_once("charset=") {
            Some((_, name)) if !matches!(name.trim().trim_matches('"'), "utf-8" | "utf8") => {
                Header::Refused(format!("messages must be UTF-8, not {}", name.trim()))
            }
            _ => Header::Other,
        },
        Some((name, _)) if !name.is_empty() && !name.contains(char::is_whitespace) => Header::Other,
        _ => Header::Odd("a line in a header is none".to_owned()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn frames(input: &str) -> Vec<Frame> {
        let mut frames = Frames::new(input.as_bytes());
        let mut all = Vec::new();
        loop {
            match frames.next() {
                Frame::End => return all,
                frame => all.push(frame),
            }
        }
    }

    fn body(text: &str) -> Frame {
        Frame::Body(text.as_bytes().to_vec())
    }

    #[test]
    fn messages_follow_each_other() {
        let input = "Content-Length: 2\r\n\r\n{}content-length:3\r\nContent-Type: application/vscode-jsonrpc; charset=utf-8\r\n\r\n[1]";
        assert_eq!(frames(input), [body("{}"), body("[1]")]);
    }

    #[test]
    fn after_a_broken_header_the_next_message_is_read() {
        for broken in [
            "nonsense\r\n\r\n",
            "Content-Length: many\r\n\r\n",
            "Content-Length: -1\r\n\r\n",
            "Content-Length: 99999999999999999999999\r\n\r\n",
            "X-Colour: blue\r\n\r\n",
        ] {
            let all = frames(&format!("{broken}Content-Length: 2\r\n\r\n{{}}"));
            assert!(
                matches!(all[..], [Frame::Broken(_), Frame::Body(_)]),
                "{broken:?}: {all:?}"
            );
        }
        let all = frames(
            "Content-Type: x; charset=latin1\r\nContent-Length: 2\r\n\r\n{}Content-Length: 2\r\n\r\n[]",
        );
        assert_eq!(all.len(), 2);
        assert_eq!(all[1], body("[]"));
    }

    #[test]
    fn what_stands_before_a_header_is_passed_over() {
        assert_eq!(
            frames("what is this\r\nContent-Length: 2\r\n\r\n{}"),
            [body("{}")]
        );
        assert_eq!(frames("foobarContent-Length: 2\r\n\r\n{}"), [body("{}")]);
        assert_eq!(frames("\r\n\r\nContent-Length: 2\r\n\r\n{}"), [body("{}")]);
    }

    #[test]
    fn an_input_that_breaks_off_ends() {
        assert_eq!(frames("Content-Length: 20\r\n\r\n{}"), []);
        assert_eq!(frames("Content-Length: 2\r\n"), []);
        assert_eq!(frames(""), []);
    }
}
