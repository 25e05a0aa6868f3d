//! Names of files, and the addresses under which editors know them.

/// The name of the file behind an address. Editors write one file as `file:///c%3A/a` and as `file:///C:/a`; both have one name.
/// An address that is no file's is its own name.
pub fn name_of(uri: &str) -> String {
    let scheme = "file://";
    let Some(path) = uri.get(scheme.len()..).filter(|_| uri.to_ascii_lowercase().starts_with(scheme)) else {
        return uri.to_owned();
    };
    let path = decoded(path.split(['?', '#']).next().unwrap_or(path));
    let path = path.strip_prefix("localhost").filter(|rest| rest.starts_with('/')).unwrap_or(&path).to_owned();
    if let Some((letter, rest)) = drive(path.strip_prefix('/').unwrap_or(&path)) {
        return format!("{}:{rest}", letter.to_ascii_uppercase());
    }
    // A host before the path is a share.
    if path.starts_with('/') { path } else { format!("//{path}") }
}

/// The address of a file.
pub fn uri_of(name: &str) -> String {
    if name.contains(':') && drive(name).is_none() && !name.starts_with('/') {
        return name.to_owned();
    }
    let mut uri = String::from(if name.starts_with("//") {
        "file:"
    } else if name.starts_with('/') {
        "file://"
    } else {
        "file:///"
    });
    for byte in name.bytes() {
        match byte {
            b'a'..=b'z' | b'A'..=b'Z' | b'0'..=b'9' | b'/' | b'-' | b'.' | b'_' | b'~' => uri.push(char::from(byte)),
            _ => uri.push_str(&format!("%{byte:02X}")),
        }
    }
    uri
}

/// The letter of a drive, and what follows its colon.
fn drive(path: &str) -> Option<(char, &str)> {
    let (letter, rest) = path.split_once(':')?;
    let mut letters = letter.chars();
    let letter = letters.next().filter(|c| c.is_ascii_alphabetic() && letters.next().is_none())?;
    (rest.is_empty() || rest.starts_with('/')).then_some((letter, rest))
}

fn decoded(text: &str) -> String {
    let bytes = text.as_bytes();
    let mut out = Vec::with_capacity(bytes.len());
    let mut at = 0;
    while let Some(byte) = bytes.get(at) {
        let escaped = (*byte == b'%')
            .then(|| bytes.get(at + 1..at + 3))
            .flatten()
            .and_then(|digits| std::str::from_utf8(digits).ok())
            .filter(|digits| digits.bytes().all(|b| b.is_ascii_hexdigit()))
            .and_then(|digits| u8::from_str_radix(digits, 16).ok());
        out.push(escaped.unwrap_or(*byte));
        at += if escaped.is_some() { 3 } else { 1 };
    }
    String::from_utf8_lossy(&out).into_owned()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn one_file_has_one_name() {
        for uri in ["file:///c%3A/a/b%20c.cbspec", "file:///C:/a/b c.cbspec", "file:///c:/a/b%20c.cbspec"] {
            assert_eq!(name_of(uri), "C:/a/b c.cbspec");
        }
        assert_eq!(name_of("file:///a/%C3%B1.cbspec"), "/a/ñ.cbspec");
        assert_eq!(name_of("file://localhost/a"), "/a");
        assert_eq!(name_of("file://share/a"), "//share/a");
        assert_eq!(name_of("file:///a%zz"), "/a%zz");
        assert_eq!(name_of("untitled:Untitled-1"), "untitled:Untitled-1");
    }

    #[test]
    fn names_and_addresses_go_there_and_back() {
        for name in ["/a/b c.cbspec", "C:/a/ñ.cbspec", "//share/a#1", "untitled:Untitled-1", "/a/x:y"] {
            assert_eq!(name_of(&uri_of(name)), name);
        }
    }
}
