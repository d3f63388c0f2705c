//! The best way to lay the neighbours of one atom on the neighbours of another.
//!
//! A maximum-weight matching in a small matrix of weights that are not negative. Up to four neighbours all permutations
//! are tried; beyond that the Hungarian method in the form of Jonker & Volgenant, Computing 38, 325 (1987).

/// Up to this many neighbours all permutations are tried.
const SMALL: usize = 4;

const PERMUTATIONS_3: [[usize; 3]; 6] = [
    [0, 1, 2],
    [0, 2, 1],
    [1, 0, 2],
    [1, 2, 0],
    [2, 0, 1],
    [2, 1, 0],
];

const PERMUTATIONS_4: [[usize; 4]; 24] = permutations_4();

const fn permutations_4() -> [[usize; 4]; 24] {
    let mut all = [[0; 4]; 24];
    let mut index = 0;
    while index < 24 {
        let rest = PERMUTATIONS_3[index % 6];
        let first = index / 6;
        all[index][0] = first;
        let mut place = 0;
        while place < 3 {
            all[index][place + 1] = rest[place] + (rest[place] >= first) as usize;
            place += 1;
        }
        index += 1;
    }
    all
}

/// The weight of the best matching.
///
/// `weights` holds the matrix row by row, `rows * columns` entries.
pub(super) fn best(weights: &[i32], rows: usize, columns: usize) -> i32 {
    let size = if rows.min(columns) < 2 {
        1
    } else {
        rows.max(columns)
    };
    match size {
        0 | 1 => weights.iter().copied().max().unwrap_or(0),
        2 => (weights[0] + weights[3]).max(weights[1] + weights[2]),
        3 => largest(&square::<3>(weights, columns), &PERMUTATIONS_3),
        SMALL => largest_of_4(&square::<4>(weights, columns)),
        _ => hungarian(weights, rows, columns, None),
    }
}

/// The weight of the best matching, and by how much it can fall short when an entry is forced into it.
///
/// `gaps` gets one entry for each of `weights`: zero for those in a best matching, and at most the true loss for others.
pub(super) fn best_and_gaps(
    weights: &[i32],
    rows: usize,
    columns: usize,
    gaps: &mut Vec<i32>,
) -> i32 {
    gaps.clear();
    let size = if rows.min(columns) < 2 {
        1
    } else {
        rows.max(columns)
    };
    match size {
        0 | 1 => {
            let best = weights.iter().copied().max().unwrap_or(0);
            gaps.extend(weights.iter().map(|weight| best - weight));
            best
        }
        2 => {
            let (straight, crossed) = (weights[0] + weights[3], weights[1] + weights[2]);
            let best = straight.max(crossed);
            gaps.extend([
                best - straight,
                best - crossed,
                best - crossed,
                best - straight,
            ]);
            best
        }
        3 => gaps_of(
            &square::<3>(weights, columns),
            &PERMUTATIONS_3,
            rows,
            columns,
            gaps,
        ),
        SMALL => gaps_of(
            &square::<4>(weights, columns),
            &PERMUTATIONS_4,
            rows,
            columns,
            gaps,
        ),
        _ => hungarian(weights, rows, columns, Some(gaps)),
    }
}

/// The places in `weights` of one best matching.
pub(super) fn choose(weights: &[i32], rows: usize, columns: usize, chosen: &mut Vec<usize>) {
    chosen.clear();
    match rows.max(columns) {
        _ if rows.min(columns) == 0 => {}
        ..=3 => choose_from(
            &square::<3>(weights, columns),
            &PERMUTATIONS_3,
            (rows, columns),
            chosen,
        ),
        SMALL => choose_from(
            &square::<4>(weights, columns),
            &PERMUTATIONS_4,
            (rows, columns),
            chosen,
        ),
        _ => {
            let (matching, turned) = match_all(weights, rows, columns);
            for (column, &row) in matching.row_at.iter().enumerate().skip(1) {
                if row != 0 {
                    let (row, column) = if turned { (column, row) } else { (row, column) };
                    chosen.push((row - 1) * columns + column - 1);
                }
            }
        }
    }
}

fn choose_from<const N: usize>(
    square: &[[i32; N]; N],
    permutations: &[[usize; N]],
    (rows, columns): (usize, usize),
    chosen: &mut Vec<usize>,
) {
    let sum =
        |permutation: &&[usize; N]| (0..N).map(|row| square[row][permutation[row]]).sum::<i32>();
    if let Some(best) = permutations.iter().max_by_key(sum) {
        let places = best.iter().enumerate().take(rows);
        let inside = places.filter(|&(_, &column)| column < columns);
        chosen.extend(inside.map(|(row, column)| row * columns + column));
    }
}

/// Matches all rows or all columns, whichever are fewer; whether they were exchanged.
fn match_all(weights: &[i32], rows: usize, columns: usize) -> (Matching, bool) {
    let turned = rows > columns;
    let matrix = Matrix {
        weights,
        columns,
        turned,
    };
    let (short, long) = (rows.min(columns), rows.max(columns));
    let mut matching = Matching::new(short, long);
    for row in 1..=short {
        matching.add(row, &matrix);
    }
    (matching, turned)
}

/// How many steps a matching of this size counts.
pub(super) fn steps(rows: usize, columns: usize) -> usize {
    let large = rows.max(columns);
    if large <= SMALL {
        1
    } else {
        1 + rows * columns * rows.min(columns) / 16
    }
}

fn square<const N: usize>(weights: &[i32], columns: usize) -> [[i32; N]; N] {
    let mut square = [[0; N]; N];
    for (row, line) in square.iter_mut().zip(weights.chunks_exact(columns)) {
        row[..columns].copy_from_slice(line);
    }
    square
}

fn largest<const N: usize>(square: &[[i32; N]; N], permutations: &[[usize; N]]) -> i32 {
    let mut best = 0;
    for permutation in permutations {
        let mut sum = 0;
        for row in 0..N {
            sum += square[row][permutation[row]];
        }
        best = best.max(sum);
    }
    best
}

/// As [`largest`]: the first two rows take two columns, the last two rows the others.
fn largest_of_4(square: &[[i32; 4]; 4]) -> i32 {
    const SPLITS: [[usize; 4]; 6] = [
        [0, 1, 2, 3],
        [0, 2, 1, 3],
        [0, 3, 1, 2],
        [1, 2, 0, 3],
        [1, 3, 0, 2],
        [2, 3, 0, 1],
    ];
    let [first, second, third, fourth] = square;
    let pair = |rows: [&[i32; 4]; 2], one: usize, other: usize| {
        (rows[0][one] + rows[1][other]).max(rows[0][other] + rows[1][one])
    };
    let split =
        |[a, b, c, d]: [usize; 4]| pair([first, second], a, b) + pair([third, fourth], c, d);
    SPLITS.into_iter().map(split).max().unwrap_or(0)
}

fn gaps_of<const N: usize>(
    square: &[[i32; N]; N],
    permutations: &[[usize; N]],
    rows: usize,
    columns: usize,
    gaps: &mut Vec<i32>,
) -> i32 {
    let mut through = [[0; N]; N];
    let mut best = 0;
    for permutation in permutations {
        let mut sum = 0;
        for row in 0..N {
            sum += square[row][permutation[row]];
        }
        for row in 0..N {
            let through = &mut through[row][permutation[row]];
            *through = sum.max(*through);
        }
        best = best.max(sum);
    }
    for row in through.iter().take(rows) {
        gaps.extend(row[..columns].iter().map(|through| best - through));
    }
    best
}

/// Any size. Gaps are the reduced costs.
fn hungarian(weights: &[i32], rows: usize, columns: usize, gaps: Option<&mut Vec<i32>>) -> i32 {
    let (matching, turned) = match_all(weights, rows, columns);
    let matrix = Matrix {
        weights,
        columns,
        turned,
    };
    let long = rows.max(columns);
    if let Some(gaps) = gaps {
        for row in 0..rows {
            for column in 0..columns {
                let (row, column) = if matrix.turned {
                    (column, row)
                } else {
                    (row, column)
                };
                let reduced = matching.reduced(row + 1, column + 1, &matrix);
                gaps.push(i32::try_from(reduced).unwrap_or(i32::MAX));
            }
        }
    }
    let chosen = (1..=long).filter(|&column| matching.row_at[column] != 0);
    let total: i64 = chosen
        .map(|column| matrix.weight(matching.row_at[column], column))
        .sum();
    i32::try_from(total).unwrap_or(i32::MAX)
}

/// Weights with rows and columns counted from 1, exchanged if there are more rows than columns.
struct Matrix<'w> {
    weights: &'w [i32],
    columns: usize,
    turned: bool,
}

impl Matrix<'_> {
    fn weight(&self, row: usize, column: usize) -> i64 {
        let (row, column) = if self.turned {
            (column, row)
        } else {
            (row, column)
        };
        i64::from(self.weights[(row - 1) * self.columns + column - 1])
    }
}

/// A matching of the rows so far, least in cost (weights count negative), with its duals.
///
/// Row 0 is no row, and column 0 is where a new row sits while its path is sought.
struct Matching {
    row_dual: Vec<i64>,
    column_dual: Vec<i64>,
    row_at: Vec<usize>,
}

impl Matching {
    fn new(rows: usize, columns: usize) -> Self {
        Self {
            row_dual: vec![0; rows + 1],
            column_dual: vec![0; columns + 1],
            row_at: vec![0; columns + 1],
        }
    }

    fn reduced(&self, row: usize, column: usize, matrix: &Matrix<'_>) -> i64 {
        -matrix.weight(row, column) - self.row_dual[row] - self.column_dual[column]
    }

    /// Matches one more row along the shortest augmenting path.
    fn add(&mut self, row: usize, matrix: &Matrix<'_>) {
        let columns = self.row_at.len();
        let mut nearest = vec![i64::MAX; columns];
        let mut before = vec![0; columns];
        let mut done = vec![false; columns];
        self.row_at[0] = row;
        let mut column = 0;
        loop {
            done[column] = true;
            let current = self.row_at[column];
            let mut next = (i64::MAX, 0);
            for other in (1..columns).filter(|&other| !done[other]) {
                let reduced = self.reduced(current, other, matrix);
                if reduced < nearest[other] {
                    nearest[other] = reduced;
                    before[other] = column;
                }
                next = next.min((nearest[other], other));
            }
            for other in 0..columns {
                if done[other] {
                    self.row_dual[self.row_at[other]] += next.0;
                    self.column_dual[other] -= next.0;
                } else if other > 0 {
                    nearest[other] -= next.0;
                }
            }
            column = next.1;
            if self.row_at[column] == 0 {
                break;
            }
        }
        while column != 0 {
            self.row_at[column] = self.row_at[before[column]];
            column = before[column];
        }
    }
}

#[cfg(test)]
mod tests {
    use super::{super::oracle::Numbers, *};

    /// All matchings, one row after the other.
    fn by_trial(weights: &[i32], columns: usize, taken: &mut Vec<usize>) -> i32 {
        let Some(row) = weights.get(..columns).filter(|row| !row.is_empty()) else {
            return 0;
        };
        let rest = &weights[columns..];
        let mut best = by_trial(rest, columns, taken);
        for (column, weight) in row.iter().enumerate() {
            if !taken.contains(&column) {
                taken.push(column);
                best = best.max(weight + by_trial(rest, columns, taken));
                taken.pop();
            }
        }
        best
    }

    #[test]
    fn every_size_equals_trial() {
        let mut numbers = Numbers::new(1);
        for rows in 0..6 {
            for columns in 0..7 {
                for _ in 0..10 {
                    let weights: Vec<i32> = (0..rows * columns)
                        .map(|_| numbers.below(9) as i32)
                        .collect();
                    let expected = by_trial(&weights, columns, &mut Vec::new());
                    let mut gaps = Vec::new();
                    assert_eq!(best(&weights, rows, columns), expected);
                    assert_eq!(best_and_gaps(&weights, rows, columns, &mut gaps), expected);
                    assert_eq!(hungarian(&weights, rows, columns, None), expected);
                    let mut chosen = Vec::new();
                    choose(&weights, rows, columns, &mut chosen);
                    let total: i32 = chosen.iter().map(|&place| weights[place]).sum();
                    assert_eq!(total, expected);
                    assert_eq!(chosen.len(), rows.min(columns));
                    assert_eq!(gaps.len(), weights.len());
                    assert!(gaps.iter().all(|&gap| gap >= 0));
                }
            }
        }
    }

    #[test]
    fn large_matrices_are_matched() {
        let size = 12;
        let weights: Vec<i32> = (0..size * size)
            .map(|index| i32::from(index % size == index / size))
            .collect();
        assert_eq!(best(&weights, size, size), 12);
        assert_eq!(best(&weights[..size * 7], 7, size), 7);
    }
}
