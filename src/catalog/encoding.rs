//! Files in UTF-8 or UTF-16, with or without a byte order mark, as a stream of UTF-8.

use std::io::{self, Read};

/// Stands in the stream for half a character of UTF-16: it is never valid UTF-8, so that the place is found again.
const DAMAGE: u8 = 0xff;

/// What the first bytes of a file say about the rest.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Encoding {
    Utf8,
    Utf16LittleEndian,
    Utf16BigEndian,
}

/// A reader of UTF-8 over a reader of UTF-8 or UTF-16.
#[derive(Debug)]
pub(super) struct Decoded<R> {
    source: R,
    encoding: Encoding,
    /// Bytes read and not yet handed out: the first ones of UTF-8, or an incomplete unit of UTF-16.
    pending: Vec<u8>,
    /// UTF-8 made from UTF-16, not yet handed out.
    ready: Vec<u8>,
    high: Option<u16>,
    ended: bool,
}

/// Why a file cannot be a table of text at all.
#[derive(Debug, thiserror::Error)]
pub(super) enum EncodingFault {
    /// Its first bytes are those of another kind of file.
    #[error("the file is {0}, not a table of text")]
    OtherKind(&'static str),
    /// It cannot be read.
    #[error(transparent)]
    Unreadable(#[from] io::Error),
}

const OTHER_KINDS: [(&[u8], &str); 7] = [
    (b"PK\x03\x04", "a spreadsheet or another zipped file"),
    (b"\xd0\xcf\x11\xe0", "an old binary spreadsheet"),
    (b"\x1f\x8b", "compressed"),
    (b"%PDF", "a PDF document"),
    (b"\xff\xfe\0\0", "in UTF-32"),
    (b"\0\0\xfe\xff", "in UTF-32"),
    (b"<!DOCTYPE", "a web page"),
];

impl<R: Read> Decoded<R> {
    /// A reader that starts behind the byte order mark of `source`.
    ///
    /// # Errors
    /// When `source` cannot be read, or begins like something else than text.
    pub(super) fn new(mut source: R) -> Result<Self, EncodingFault> {
        let mut pending = Vec::with_capacity(16);
        source.by_ref().take(16).read_to_end(&mut pending)?;
        if let Some((_, kind)) = OTHER_KINDS.iter().find(|(start, _)| pending.starts_with(start)) {
            return Err(EncodingFault::OtherKind(kind));
        }
        let (encoding, mark) = match pending.as_slice() {
            [0xef, 0xbb, 0xbf, ..] => (Encoding::Utf8, 3),
            [0xff, 0xfe, ..] => (Encoding::Utf16LittleEndian, 2),
            [0xfe, 0xff, ..] => (Encoding::Utf16BigEndian, 2),
            [_, 0, _, 0, ..] | [0, _, 0, _, ..] => {
                return Err(EncodingFault::OtherKind("in UTF-16 without a byte order mark, or binary"));
            }
            _ => (Encoding::Utf8, 0),
        };
        pending.drain(..mark);
        Ok(Self { source, encoding, pending, ready: Vec::new(), high: None, ended: false })
    }

    fn decode_some(&mut self) -> io::Result<()> {
        while self.ready.is_empty() && !self.ended {
            let kept = self.pending.len();
            self.pending.resize(kept + 32 * 1024, 0);
            let read = read_retrying(&mut self.source, &mut self.pending[kept..])?;
            self.pending.truncate(kept + read);
            let pending = std::mem::take(&mut self.pending);
            let mut units = pending.chunks_exact(2);
            for unit in units.by_ref() {
                self.unit(unit[0], unit[1]);
            }
            self.pending.extend_from_slice(units.remainder());
            if read == 0 {
                self.ended = true;
                if self.high.take().is_some() || !self.pending.is_empty() {
                    self.ready.push(DAMAGE);
                }
            }
        }
        Ok(())
    }

    fn unit(&mut self, first: u8, second: u8) {
        let unit = match self.encoding {
            Encoding::Utf16BigEndian => u16::from_be_bytes([first, second]),
            _ => u16::from_le_bytes([first, second]),
        };
        if self.high.is_none() && (0xd800..0xdc00).contains(&unit) {
            self.high = Some(unit);
            return;
        }
        for decoded in char::decode_utf16(self.high.take().into_iter().chain([unit])) {
            match decoded {
                Ok(letter) => self.ready.extend_from_slice(letter.encode_utf8(&mut [0; 4]).as_bytes()),
                Err(_) => self.ready.push(DAMAGE),
            }
        }
    }
}

fn read_retrying(source: &mut impl Read, into: &mut [u8]) -> io::Result<usize> {
    loop {
        match source.read(into) {
            Err(error) if error.kind() == io::ErrorKind::Interrupted => {}
            other => return other,
        }
    }
}

fn hand_out(from: &mut Vec<u8>, into: &mut [u8]) -> usize {
    let length = from.len().min(into.len());
    into[..length].copy_from_slice(&from[..length]);
    from.drain(..length);
    length
}

impl<R: Read> Read for Decoded<R> {
    fn read(&mut self, into: &mut [u8]) -> io::Result<usize> {
        if self.encoding == Encoding::Utf8 {
            return match self.pending.is_empty() {
                true => read_retrying(&mut self.source, into),
                false => Ok(hand_out(&mut self.pending, into)),
            };
        }
        self.decode_some()?;
        Ok(hand_out(&mut self.ready, into))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn decoded(bytes: &[u8]) -> Vec<u8> {
        let mut text = Vec::new();
        Decoded::new(bytes).expect("text").read_to_end(&mut text).expect("in memory");
        text
    }

    fn utf16(text: &str, to_bytes: fn(u16) -> [u8; 2]) -> Vec<u8> {
        std::iter::once(0xfeff).chain(text.encode_utf16()).flat_map(to_bytes).collect()
    }

    #[test]
    fn every_encoding_gives_the_same_text() {
        let text = "part;Ω 𝛀\r\nx";
        assert_eq!(decoded(text.as_bytes()), text.as_bytes());
        assert_eq!(decoded(format!("\u{feff}{text}").as_bytes()), text.as_bytes());
        assert_eq!(decoded(&utf16(text, u16::to_le_bytes)), text.as_bytes());
        assert_eq!(decoded(&utf16(text, u16::to_be_bytes)), text.as_bytes());
        assert_eq!(decoded(b""), b"");
    }

    #[test]
    fn half_characters_are_marked() {
        assert_eq!(decoded(&[0xff, 0xfe, b'a', 0, 0, 0xd8, b'b', 0]), [b'a', DAMAGE, b'b']);
        assert_eq!(decoded(&[0xff, 0xfe, b'a', 0, 0, 0xd8]), [b'a', DAMAGE]);
        assert_eq!(decoded(&[0xff, 0xfe, b'a', 0, b'b']), [b'a', DAMAGE]);
    }

    #[test]
    fn other_kinds_of_file_are_named() {
        for bytes in [&b"PK\x03\x04..."[..], b"\x1f\x8b..", b"p\0a\0r\0t\0"] {
            assert!(matches!(Decoded::new(bytes), Err(EncodingFault::OtherKind(_))), "{bytes:?}");
        }
    }
}
