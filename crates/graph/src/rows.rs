//! Lists of lists in one run of memory.

/// Rows of items, one after the other. A view that is loaded with one molecule after the other keeps
/// its memory, however many rows the last one had; lists of lists would not.
#[derive(Debug, PartialEq, Eq)]
pub(crate) struct Rows<T> {
    items: Vec<T>,
    /// Per row: where it ends.
    ends: Vec<usize>,
}

impl<T> Default for Rows<T> {
    fn default() -> Self {
        Self {
            items: Vec::new(),
            ends: Vec::new(),
        }
    }
}

impl<T: Clone> Clone for Rows<T> {
    fn clone(&self) -> Self {
        Self {
            items: self.items.clone(),
            ends: self.ends.clone(),
        }
    }

    /// Keeps the memory, which the derived one would not.
    fn clone_from(&mut self, source: &Self) {
        self.items.clone_from(&source.items);
        self.ends.clone_from(&source.ends);
    }
}

impl<T> Rows<T> {
    pub(crate) fn clear(&mut self) {
        self.items.clear();
        self.ends.clear();
    }

    pub(crate) fn is_empty(&self) -> bool {
        self.ends.is_empty()
    }

    /// Appends a row and returns it.
    pub(crate) fn push(&mut self, row: impl IntoIterator<Item = T>) -> &mut [T] {
        let start = self.items.len();
        self.items.extend(row);
        self.ends.push(self.items.len());
        &mut self.items[start..]
    }

    pub(crate) fn iter(&self) -> impl ExactSizeIterator<Item = &[T]> {
        let mut start = 0;
        self.ends.iter().map(move |&end| {
            let row = &self.items[start..end];
            start = end;
            row
        })
    }
}

impl<T, R: IntoIterator<Item = T>> FromIterator<R> for Rows<T> {
    fn from_iter<I: IntoIterator<Item = R>>(rows: I) -> Self {
        let mut all = Self::default();
        for row in rows {
            all.push(row);
        }
        all
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rows_come_back_as_they_went_in() {
        let lists = [vec![1, 2], vec![], vec![3]];
        let mut rows: Rows<u32> = lists.clone().into_iter().collect();
        assert!(rows.iter().eq(&lists));
        assert_ne!(rows, [vec![1], vec![2], vec![3]].into_iter().collect());
        rows.push([4, 5]).reverse();
        assert_eq!(rows.iter().last(), Some(&[5, 4][..]));
        let mut copy = Rows::default();
        copy.clone_from(&rows);
        assert_eq!(copy, rows);
        rows.clear();
        assert!(rows.is_empty() && rows.iter().next().is_none());
    }
}
