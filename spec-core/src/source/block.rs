//! Blocks: a text cut before each heading, so that an edit leaves the other blocks, and all that was made of them, as they are.

use std::sync::Arc;

use firstpole_grammar::{Line, LineKind, Look, Span, read_lines};

use crate::particular::SheetKind;

/// The number of a block. It stays the same while the text around the block changes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct BlockId(pub(crate) u32);

/// The lines from a heading to the next, or those before the first heading.
#[derive(Debug, PartialEq)]
pub struct Block {
    /// The lines; they count from the start of the block.
    pub lines: Vec<Line>,
    /// Bytes, endings of lines included.
    pub len: u32,
}

/// A block in its text.
#[derive(Clone, Debug)]
pub struct BlockAt {
    /// Its number.
    pub id: BlockId,
    /// Where it starts.
    pub start: u32,
    /// What stands in it.
    pub block: Arc<Block>,
}

impl BlockAt {
    /// Where it ends.
    pub fn end(&self) -> u32 {
        self.start + self.block.len
    }

    fn text<'a>(&self, text: &'a str) -> &'a str {
        Span::new(self.start, self.end()).of(text)
    }
}

/// The numbers that are given to blocks; those of blocks that are gone are given again.
#[derive(Clone, Debug, Default)]
pub struct Numbers {
    next: u32,
    free: Vec<BlockId>,
}

impl Numbers {
    fn take(&mut self) -> BlockId {
        self.free.pop().unwrap_or_else(|| {
            self.next += 1;
            BlockId(self.next - 1)
        })
    }

    /// Takes the numbers of blocks back.
    pub fn give_back(&mut self, blocks: &[BlockAt]) {
        self.free.extend(blocks.iter().map(|at| at.id));
    }

    /// How many numbers there are, given or free.
    pub const fn count(&self) -> usize {
        self.next as usize
    }
}

/// The kind of sheet that a line opens, if it opens one. A word that is near to one of a kind opens it too.
pub fn opens(line: &LineKind, line_text: &str) -> Option<SheetKind> {
    match line {
        LineKind::Heading(heading) => SheetKind::read(&heading.kind).or_else(|| SheetKind::nearest(&heading.kind)),
        LineKind::Broken { look: Look::Heading { kind, .. }, .. } => SheetKind::read(kind.of(line_text)),
        _ => None,
    }
}

/// Cuts a text into blocks. There is always at least one.
pub fn cut(text: &str, numbers: &mut Numbers) -> Vec<BlockAt> {
    let start = if text.starts_with('\u{feff}') { '\u{feff}'.len_utf8() } else { 0 };
    let mut blocks = cut_piece(text, 0, start);
    for at in &mut blocks {
        at.id = numbers.take();
    }
    blocks
}

/// Cuts a text that differs from `old_text` as far as it differs, and takes over the other blocks.
pub fn cut_again(text: &str, old_text: &str, old: &[BlockAt], numbers: &mut Numbers) -> Vec<BlockAt> {
    let (before, after) = common_ends(old_text, text);
    // One more block on either side is read again, since an edit at its border may have moved the border.
    let touched = old.partition_point(|at| (at.end() as usize) <= before);
    let head = touched.saturating_sub(1);
    let untouched = old_text.len() - after;
    let tail = (old.partition_point(|at| (at.start as usize) < untouched) + 1).clamp(head, old.len());
    let (Some(kept_head), Some(middle), Some(kept_tail)) = (old.get(..head), old.get(head..tail), old.get(tail..))
    else {
        return cut(text, numbers);
    };
    let from = kept_head.last().map_or(0, BlockAt::end) as usize;
    let moved = |offset: u32| offset as usize + text.len() - old_text.len();
    let to = kept_tail.first().map_or(text.len(), |at| moved(at.start));
    let lines_from = if from == 0 && text.starts_with('\u{feff}') { '\u{feff}'.len_utf8() } else { from };
    let mut new = if from == to && kept_head.len() + kept_tail.len() > 0 {
        Vec::new()
    } else {
        cut_piece(text.get(..to).unwrap_or(""), from, lines_from)
    };
    take_over(&mut new, text, middle, old_text, numbers);
    let mut all = Vec::with_capacity(head + new.len() + kept_tail.len());
    all.extend_from_slice(kept_head);
    all.append(&mut new);
    all.extend(kept_tail.iter().map(|at| BlockAt { start: moved(at.start) as u32, ..at.clone() }));
    all
}

/// Cuts what stands from `from` to the end of `text`; its lines start at `lines_from`. Numbers are given later.
fn cut_piece(text: &str, from: usize, lines_from: usize) -> Vec<BlockAt> {
    let mut blocks: Vec<BlockAt> = Vec::new();
    let mut start = from as u32;
    let mut lines: Vec<Line> = Vec::new();
    let mut close = |start: u32, end: u32, lines: Vec<Line>| {
        let block = Arc::new(Block { lines, len: end - start });
        blocks.push(BlockAt { id: BlockId(0), start, block });
    };
    for mut line in read_lines(text, lines_from) {
        let content = Span::new(line.start, line.start + line.len).of(text);
        if !lines.is_empty() && opens(&line.kind, content).is_some() {
            let mut whole = std::mem::take(&mut lines);
            whole.shrink_to_fit();
            close(start, line.start, whole);
            start = line.start;
        }
        line.start -= start;
        lines.push(line);
    }
    close(start, text.len() as u32, lines);
    blocks
}

/// Gives new blocks the numbers of the old ones in their place, and takes over those whose text is the same.
fn take_over(new: &mut [BlockAt], text: &str, old: &[BlockAt], old_text: &str, numbers: &mut Numbers) {
    let same = |new: &BlockAt, old: &BlockAt| new.text(text) == old.text(old_text);
    let shorter = new.len().min(old.len());
    let front = new.iter().zip(old).take_while(|(new, old)| same(new, old)).count();
    let back = new.iter().rev().zip(old.iter().rev()).take_while(|(new, old)| same(new, old)).count();
    let back = back.min(shorter - front);
    let count = new.len();
    for (at, block) in new.iter_mut().enumerate() {
        let is_same = at < front || at >= count - back;
        let counterpart = if at >= count - back {
            old.get(at + old.len() - count)
        } else {
            old.get(at).filter(|_| at < old.len() - back)
        };
        match counterpart {
            Some(counterpart) => {
                block.id = counterpart.id;
                if is_same {
                    block.block = counterpart.block.clone();
                }
            }
            None => block.id = numbers.take(),
        }
    }
    // Old ones between the front and the back that have no counterpart are gone.
    numbers.give_back(old.get(count - back..old.len() - back).unwrap_or(&[]));
}

/// How many bytes two texts have in common at their starts, and at their ends without those.
fn common_ends(old: &str, new: &str) -> (usize, usize) {
    let (old, new) = (old.as_bytes(), new.as_bytes());
    let shorter = old.len().min(new.len());
    let front = common_start(old, new, shorter);
    let (old, new) = (old.get(front..).unwrap_or(&[]), new.get(front..).unwrap_or(&[]));
    (front, common_end(old, new, shorter - front))
}

/// Bytes that are compared at once.
const PIECE: usize = 4096;

fn common_start(a: &[u8], b: &[u8], most: usize) -> usize {
    let whole = a.chunks(PIECE).zip(b.chunks(PIECE)).take_while(|(a, b)| a.len() == b.len() && a == b);
    let start: usize = whole.map(|(a, _)| a.len()).sum();
    let rest = a.iter().zip(b).skip(start).take_while(|(a, b)| a == b).count();
    (start + rest).min(most)
}

fn common_end(a: &[u8], b: &[u8], most: usize) -> usize {
    let whole = a.rchunks(PIECE).zip(b.rchunks(PIECE)).take_while(|(a, b)| a.len() == b.len() && a == b);
    let end: usize = whole.map(|(a, _)| a.len()).sum();
    let rest = a.iter().rev().zip(b.iter().rev()).skip(end).take_while(|(a, b)| a == b).count();
    (end + rest).min(most)
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn check(old_text: &str, text: &str) {
        let mut numbers = Numbers::default();
        let old = cut(old_text, &mut numbers);
        let again = cut_again(text, old_text, &old, &mut numbers);
        let fresh = cut(text, &mut Numbers::default());
        assert_eq!(again.len(), fresh.len(), "{old_text:?} -> {text:?}");
        for (again, fresh) in again.iter().zip(&fresh) {
            assert_eq!((again.start, &again.block), (fresh.start, &fresh.block), "{old_text:?} -> {text:?}");
        }
        let mut ids: Vec<BlockId> = again.iter().map(|at| at.id).chain(numbers.free.iter().copied()).collect();
        ids.sort_unstable();
        let all: Vec<BlockId> = (0..numbers.next).map(BlockId).collect();
        assert_eq!(ids, all, "every number is given once or free: {old_text:?} -> {text:?}");
    }

    const TEXT: &str = "cbspec 1\n\nsystem A\n  X/R: 14\nsite B\n altitude: 3 m\n\nbreaker C on A\n Ur: 145 kV";

    #[test]
    fn blocks_cover_the_text() {
        let blocks = cut(TEXT, &mut Numbers::default());
        let texts: String = blocks.iter().map(|at| at.text(TEXT)).collect();
        assert_eq!(texts, TEXT);
        assert_eq!(blocks.len(), 4);
        assert_eq!(cut("", &mut Numbers::default()).len(), 1);
        assert_eq!(cut("\u{feff}site A\n", &mut Numbers::default()).len(), 1);
    }

    #[test]
    fn an_edit_leaves_the_others() {
        let mut numbers = Numbers::default();
        let old = cut(TEXT, &mut numbers);
        let text = TEXT.replace("3 m", "1300 m");
        let new = cut_again(&text, TEXT, &old, &mut numbers);
        for (at, (old, new)) in old.iter().zip(&new).enumerate() {
            assert_eq!(old.id, new.id);
            assert_eq!(Arc::ptr_eq(&old.block, &new.block), at != 2, "block {at}");
        }
    }

    #[test]
    fn borders_move() {
        for (from, to) in [
            ("site B", "sight to B"),
            ("\nsite B", "site B"),
            ("\n\nbreaker", "\r\rbreaker"),
            ("\nsystem", "\r\nsystem"),
            ("cbspec 1\n\n", ""),
            ("cbspec 1\n", "\u{feff}cbspec 1\n"),
            ("X/R", "site D\nX/R"),
            ("145 kV", "145 kV\nsite E\n"),
            ("145 kV", ""),
        ] {
            check(TEXT, &TEXT.replace(from, to));
            check(&TEXT.replace(from, to), TEXT);
        }
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(400))]
        #[test]
        fn cut_again_is_as_cut(
            old in "(site A\n|breaker B\r\n| Ur: 1 kV\n|\r|\n|x|\u{feff}|µ|syst em){0,12}",
            start in 0_usize..60, len in 0_usize..20, put in "(site A\n|\n|\r|x|site |breaker B|\u{feff}|\n\n){0,3}",
        ) {
            let start = old.floor_char_boundary(start.min(old.len()));
            let end = old.floor_char_boundary((start + len).min(old.len())).max(start);
            let mut new = old.clone();
            new.replace_range(start..end, &put);
            check(&old, &new);
        }
    }
}
