//! A dense linear system solved in its own memory: the pressure balance is
//! small and asked for thousands of times, and must not allocate.

/// Solves `A x = b` by elimination with row pivoting; `a` (row by row, the
/// first `n * n` places) is destroyed and `b` becomes `x`. False when `A` is
/// singular or not finite.
pub fn solve_in_place(a: &mut [f64], b: &mut [f64], n: usize) -> bool {
    for column in 0..n {
        let mut pivot = column;
        for row in column + 1..n {
            if a[row * n + column].abs() > a[pivot * n + column].abs() {
                pivot = row;
            }
        }
        let value = a[pivot * n + column];
        if !(value.abs() > 0.0 && value.is_finite()) {
            return false;
        }
        if pivot != column {
            for k in column..n {
                a.swap(pivot * n + k, column * n + k);
            }
            b.swap(pivot, column);
        }
        for row in column + 1..n {
            let factor = a[row * n + column] / value;
            if factor == 0.0 {
                continue;
            }
            for k in column + 1..n {
                a[row * n + k] -= factor * a[column * n + k];
            }
            b[row] -= factor * b[column];
        }
    }
    for row in (0..n).rev() {
        let mut sum = b[row];
        for k in row + 1..n {
            sum -= a[row * n + k] * b[k];
        }
        b[row] = sum / a[row * n + row];
    }
    b[..n].iter().all(|x| x.is_finite())
}

#[cfg(test)]
mod tests {
    use super::solve_in_place;
    use nalgebra::{DMatrix, DVector};

    #[test]
    fn verify_against_an_independent_library() {
        let n = 5;
        let entries: Vec<f64> = (0..n * n)
            .map(|i| {
                let scattered = ((i * i * 31 + i * 17 + 5) % 97) as f64 - 48.0;
                if i % (n + 1) == 0 {
                    scattered + 150.0
                } else {
                    scattered
                }
            })
            .collect();
        let right: Vec<f64> = (0..n).map(|i| i as f64 - 1.5).collect();
        let matrix = DMatrix::from_row_slice(n, n, &entries);
        let expected = matrix
            .lu()
            .solve(&DVector::from_row_slice(&right))
            .expect("regular");
        let (mut a, mut b) = (entries, right);
        assert!(solve_in_place(&mut a, &mut b, n));
        for i in 0..n {
            assert!((b[i] - expected[i]).abs() < 1e-12 * expected.amax());
        }
    }

    #[test]
    fn verify_a_singular_matrix_is_refused() {
        let (mut a, mut b) = (vec![1.0, 2.0, 2.0, 4.0], vec![1.0, 1.0]);
        assert!(!solve_in_place(&mut a, &mut b, 2));
    }
}
