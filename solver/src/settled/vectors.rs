//! Vectors over the wall's nodes, stored in blocks: storing one allocates nothing while its block has room.

/// Vectors of a block.
const BLOCK: usize = 32;

/// A growing list of vectors of one length.
#[derive(Debug, Clone, Default)]
pub(super) struct Vectors {
    length: usize,
    count: usize,
    blocks: Vec<Vec<f64>>,
}

impl Vectors {
    /// No vector yet, each to be `length` long.
    pub(super) fn new(length: usize) -> Self {
        Self { length, count: 0, blocks: Vec::new() }
    }

    /// Makes room for at least one more vector; allocates once in [`BLOCK`] of them.
    pub(super) fn make_room(&mut self) {
        if self.count == self.blocks.len() * BLOCK {
            self.blocks.push(Vec::with_capacity(BLOCK * self.length));
        }
    }

    /// Adds a vector.
    pub(super) fn push(&mut self, values: impl Iterator<Item = f64>) {
        self.make_room();
        if let Some(block) = self.blocks.last_mut() {
            block.extend(values.take(self.length));
            self.count += 1;
            debug_assert_eq!(block.len(), ((self.count - 1) % BLOCK + 1) * self.length, "a whole vector");
        }
    }

    /// Number of vectors.
    pub(super) fn len(&self) -> usize {
        self.count
    }

    /// Length of each.
    pub(super) fn length(&self) -> usize {
        self.length
    }

    /// Vector `k`.
    pub(super) fn get(&self, k: usize) -> &[f64] {
        let at = (k % BLOCK) * self.length;
        &self.blocks[k / BLOCK][at..at + self.length]
    }

    /// All vectors in order.
    pub(super) fn iter(&self) -> impl Iterator<Item = &[f64]> {
        (0..self.count).map(|k| self.get(k))
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, clippy::cast_precision_loss, reason = "whole numbers")]
    use super::*;

    #[test]
    fn vectors_come_back_in_order_across_blocks() {
        let mut vectors = Vectors::new(3);
        for k in 0..2 * BLOCK + 5 {
            vectors.push((0..3).map(|i| (3 * k + i) as f64));
        }
        assert_eq!(vectors.len(), 2 * BLOCK + 5);
        let flat: Vec<f64> = vectors.iter().flatten().copied().collect();
        assert_eq!(flat, (0..3 * vectors.len()).map(|x| x as f64).collect::<Vec<_>>());
        assert_eq!(vectors.get(BLOCK), &[3.0 * BLOCK as f64, 3.0 * BLOCK as f64 + 1.0, 3.0 * BLOCK as f64 + 2.0]);
    }
}
