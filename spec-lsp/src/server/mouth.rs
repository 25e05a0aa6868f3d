//! The one writer of the output: whole bodies from the protocol library and from the task that tells of findings, one after the other.

use tokio::io::{AsyncRead, AsyncWrite, AsyncWriteExt};
use tokio::sync::mpsc;

use super::pump::Frames;

/// Bodies that may wait for a client that reads slowly. What waits may be outdated, so they are few.
pub const WAITING: usize = 4;

/// Writes bodies until nobody can send any more, or the client does not read.
pub async fn speak<O: AsyncWrite + Unpin>(mut output: O, mut bodies: mpsc::Receiver<Vec<u8>>) {
    while let Some(body) = bodies.recv().await {
        let header = format!("Content-Length: {}\r\n\r\n", body.len());
        let sent = async {
            output.write_all(header.as_bytes()).await?;
            output.write_all(&body).await?;
            output.flush().await
        };
        if sent.await.is_err() {
            return;
        }
    }
}

/// Hands the bodies on that the protocol library writes.
pub async fn hand_on<I: AsyncRead + Unpin>(library: I, mouth: mpsc::Sender<Vec<u8>>) {
    let mut frames = Frames::of(library);
    while let Some(frame) = frames.next().await {
        // The library writes nothing but frames.
        let Ok(body) = frame else { continue };
        if mouth.send(body).await.is_err() {
            return;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[tokio::test]
    async fn bodies_stay_whole() {
        let (mut library, far) = tokio::io::duplex(7);
        let (output, heard) = tokio::io::duplex(5);
        let (mouth, bodies) = mpsc::channel(WAITING);
        tokio::spawn(hand_on(far, mouth.clone()));
        tokio::spawn(speak(output, bodies));
        tokio::spawn(async move {
            for _ in 0..50 {
                library.write_all(b"Content-Length: 10\r\n\r\n[1,2,3,45]").await.expect("written");
            }
        });
        tokio::spawn(async move {
            for _ in 0..50 {
                mouth.send(b"{\"a\":1}".to_vec()).await.expect("sent");
            }
        });
        let mut frames = Frames::of(heard);
        let mut seen = [0, 0];
        while let Some(body) = frames.next().await {
            match body.expect("a frame").as_slice() {
                b"[1,2,3,45]" => seen[0] += 1,
                b"{\"a\":1}" => seen[1] += 1,
                other => panic!("{}", String::from_utf8_lossy(other)),
            }
        }
        assert_eq!(seen, [50, 50]);
    }
}
