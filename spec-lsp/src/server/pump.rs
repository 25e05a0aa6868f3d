//! The pump between the client and the protocol library: it reads whole frames, and lets through only what can be decoded.
//!
//! The library ends at the first frame that it cannot decode, and does not return on `exit` while the input stays open. So bad
//! frames are dropped here with a line in the log, and after `exit` nothing more is let through.

use tokio::io::{AsyncRead, AsyncReadExt, AsyncWrite, AsyncWriteExt};

/// The largest body that is let through.
pub const LARGEST_FRAME: usize = 64 * 1024 * 1024;

/// The longest line of a header; what is longer is no header.
const LONGEST_HEADER: usize = 8 * 1024;

/// What a body says, as far as the pump has to know.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Heard {
    /// The method; empty for an answer.
    pub method: String,
}

/// Moves frames from `input` to `server` until `exit` or the end of the input. `hear` decodes a body as the server will; `log`
/// takes a line about each frame that is dropped. Tells whether the client took its leave in order: `shutdown` before `exit`.
pub async fn pump<I, S>(input: I, mut server: S, hear: fn(&str) -> Option<Heard>, log: impl Fn(String)) -> bool
where
    I: AsyncRead + Unpin,
    S: AsyncWrite + Unpin,
{
    let mut frames = Frames::of(input);
    let (mut begun, mut shut_down) = (false, false);
    while let Some(frame) = frames.next().await {
        let body = match frame {
            Ok(body) => body,
            Err(fault) => {
                log(fault);
                continue;
            }
        };
        let Some((text, heard)) = readable(body, hear) else {
            log("a message that cannot be decoded was dropped".to_owned());
            continue;
        };
        match heard.method.as_str() {
            "initialize" => begun = true,
            "shutdown" => shut_down = shut_down || begun,
            _ => {}
        }
        let header = format!("Content-Length: {}\r\n\r\n", text.len());
        let sent = async {
            server.write_all(header.as_bytes()).await?;
            server.write_all(text.as_bytes()).await?;
            server.flush().await
        };
        if sent.await.is_err() || heard.method == "exit" {
            break;
        }
    }
    // An error means that the server has closed its end already.
    let _ = server.shutdown().await;
    shut_down
}

fn readable(mut body: Vec<u8>, hear: fn(&str) -> Option<Heard>) -> Option<(String, Heard)> {
    mend_surrogates(&mut body);
    let text = String::from_utf8(body).ok()?;
    let heard = hear(&text)?;
    Some((text, heard))
}

/// Puts U+FFFD in place of every half of a surrogate pair that stands alone in an escape. Editors send them when an edit cuts a
/// character in two.
fn mend_surrogates(body: &mut [u8]) {
    let mut at = 0;
    while let Some(found) = body.get(at..).and_then(|rest| rest.iter().position(|byte| *byte == b'\\')) {
        at += found;
        let Some(unit) = escaped_unit(body, at) else {
            // Another escape: the character after the backslash belongs to it.
            at += 2;
            continue;
        };
        let paired = (0xd800..0xdc00).contains(&unit)
            && escaped_unit(body, at + 6).is_some_and(|next| (0xdc00..0xe000).contains(&next));
        if paired {
            at += 12;
            continue;
        }
        if (0xd800..0xe000).contains(&unit)
            && let Some(digits) = body.get_mut(at + 2..at + 6)
        {
            digits.copy_from_slice(b"FFFD");
        }
        at += 6;
    }
}

/// The code unit of the escape `\uXXXX` at `at`.
fn escaped_unit(body: &[u8], at: usize) -> Option<u32> {
    let digits = body.get(at..at + 6)?.strip_prefix(b"\\u")?;
    let digits = std::str::from_utf8(digits).ok()?;
    digits.bytes().all(|byte| byte.is_ascii_hexdigit()).then(|| u32::from_str_radix(digits, 16).ok())?
}

/// Cuts the input into frames.
pub struct Frames<I> {
    input: I,
    buffer: Vec<u8>,
    /// Bytes of the buffer that are done with.
    at: usize,
    ended: bool,
}

impl<I: AsyncRead + Unpin> Frames<I> {
    /// The frames of an input.
    pub const fn of(input: I) -> Self {
        Self { input, buffer: Vec::new(), at: 0, ended: false }
    }

    /// The body of the next frame, or a sentence on why there is none; nothing at the end of the input.
    pub async fn next(&mut self) -> Option<Result<Vec<u8>, String>> {
        let mut length = None;
        loop {
            let line = match self.line().await? {
                Ok(line) => line,
                Err(fault) => return Some(Err(fault)),
            };
            if line.is_empty() {
                match length {
                    Some(length) => return self.body(length).await,
                    None => continue,
                }
            }
            // The name is looked for anywhere, so that the rest of a broken frame before it does not take this one along.
            let lower = line.to_ascii_lowercase();
            let name = "content-length:";
            match lower.rfind(name).and_then(|at| lower.get(at + name.len()..)) {
                Some(number) => match number.trim().parse::<usize>() {
                    Ok(number) => length = Some(number),
                    Err(_) => return Some(Err("a header without a readable length was dropped".to_owned())),
                },
                None if line.contains(':') => {}
                None => return Some(Err("a line that is no header was dropped".to_owned())),
            }
        }
    }

    /// The next line of a header, without its ending.
    async fn line(&mut self) -> Option<Result<String, String>> {
        loop {
            let rest = self.buffer.get(self.at..).unwrap_or(&[]);
            if let Some(end) = rest.iter().position(|byte| *byte == b'\n') {
                let line = String::from_utf8_lossy(rest.get(..end).unwrap_or(&[])).trim_end_matches('\r').to_owned();
                self.at += end + 1;
                return Some(Ok(line));
            }
            if rest.len() > LONGEST_HEADER {
                // The end is kept: a header may begin in it.
                self.at = self.buffer.len() - 64;
                return Some(Err("text that is no header was dropped".to_owned()));
            }
            if !self.more().await {
                return None;
            }
        }
    }

    async fn body(&mut self, length: usize) -> Option<Result<Vec<u8>, String>> {
        if length > LARGEST_FRAME {
            let mut left = length;
            loop {
                let here = (self.buffer.len() - self.at).min(left);
                self.at += here;
                left -= here;
                if left == 0 {
                    return Some(Err(format!(
                        "a message of {length} bytes was dropped; the largest has {LARGEST_FRAME}"
                    )));
                }
                if !self.more().await {
                    return None;
                }
            }
        }
        while self.buffer.len() - self.at < length {
            if !self.more().await {
                return None;
            }
        }
        let body = self.buffer.get(self.at..self.at + length).unwrap_or(&[]).to_vec();
        self.at += length;
        Some(Ok(body))
    }

    /// Reads on; tells whether there was more.
    async fn more(&mut self) -> bool {
        if self.ended {
            return false;
        }
        self.buffer.drain(..self.at);
        self.at = 0;
        if self.buffer.is_empty() && self.buffer.capacity() > 1024 * 1024 {
            self.buffer = Vec::new();
        }
        self.buffer.reserve(64 * 1024);
        match self.input.read_buf(&mut self.buffer).await {
            Ok(count) if count > 0 => true,
            _ => {
                self.ended = true;
                false
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use std::sync::Mutex;

    use super::*;

    fn hear(body: &str) -> Option<Heard> {
        let value: serde_json::Value = serde_json::from_str(body).ok()?;
        Some(Heard { method: value.as_object()?.get("method").and_then(|m| m.as_str()).unwrap_or("").to_owned() })
    }

    fn frame(body: &str) -> String {
        format!("Content-Length: {}\r\n\r\n{body}", body.len())
    }

    fn method(name: &str) -> String {
        frame(&format!("{{\"method\":\"{name}\"}}"))
    }

    /// What comes through, what is logged, and whether the leave was in order.
    fn pumped(input: &[u8]) -> (String, usize, bool) {
        let runtime = tokio::runtime::Builder::new_current_thread().build().expect("a runtime");
        let (mut out, logged) = (Vec::new(), Mutex::new(0));
        let orderly = runtime.block_on(pump(input, &mut out, hear, |_| *logged.lock().expect("a lock") += 1));
        let logged = *logged.lock().expect("a lock");
        (String::from_utf8(out).expect("text"), logged, orderly)
    }

    #[test]
    fn whole_frames_come_through_unchanged() {
        let input = method("initialize") + &method("ä°😀");
        assert_eq!(pumped(input.as_bytes()), (input, 0, false));
    }

    #[test]
    fn bad_frames_are_dropped_and_those_after_them_come_through() {
        let good = method("a");
        for bad in [
            frame("{\"method\":"),
            frame("[1, 2]"),
            "Content-Length: many\r\n\r\n".to_owned(),
            "what is this\r\n\r\n".to_owned(),
            frame("{}").replace("Content-Length: 2", "Content-Length: 1"),
            "\r\n\r\n".to_owned(),
            "x".repeat(3 * LONGEST_HEADER) + "\r\n",
        ] {
            let input = good.clone() + &bad + &good;
            let (out, _, _) = pumped(input.as_bytes());
            assert_eq!(out, good.clone() + &good, "{}", bad.get(..40).unwrap_or(&bad));
        }
        let mut bytes = b"Content-Length: 2\r\n\r\n\xff\xfe".to_vec();
        bytes.extend(good.as_bytes());
        assert_eq!(pumped(&bytes), (good, 1, false));
    }

    #[test]
    fn a_body_that_is_too_large_is_passed_over() {
        let mut input = format!("Content-Length: {}\r\n\r\n", LARGEST_FRAME + 1).into_bytes();
        input.resize(input.len() + LARGEST_FRAME + 1, b' ');
        let good = method("a");
        input.extend(good.as_bytes());
        assert_eq!(pumped(&input), (good, 1, false));
    }

    #[test]
    fn half_surrogates_become_replacement_characters() {
        for (said, meant) in [
            (r"\ud83d", r"\uFFFD"),
            (r"\ude00x", r"\uFFFDx"),
            (r"\ud83d\ude00", r"\ud83d\ude00"),
            (r"\ud83d\ud83d\ude00", r"\uFFFD\ud83d\ude00"),
            (r"\\ud83d", r"\\ud83d"),
            (r"\\\ud83d", r"\\\uFFFD"),
            (r"\ud8", r"\ud8"),
            (r"\n\u00b0", r"\n\u00b0"),
        ] {
            let mut bytes = said.as_bytes().to_vec();
            mend_surrogates(&mut bytes);
            assert_eq!(String::from_utf8(bytes).expect("text"), meant, "{said}");
        }
    }

    #[test]
    fn nothing_comes_through_after_exit_and_the_leave_is_told() {
        let exit = method("exit");
        let (out, _, orderly) = pumped((exit.clone() + &method("late")).as_bytes());
        assert_eq!((out.as_str(), orderly), (exit.as_str(), false));
        let leave = method("initialize") + &method("shutdown") + &exit;
        assert!(pumped(leave.as_bytes()).2);
        assert!(!pumped((method("shutdown") + &exit).as_bytes()).2, "nothing had begun");
    }
}
