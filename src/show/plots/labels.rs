//! Places for labels that must not lie on each other.

/// Moves wished heights apart until neighbours are `spacing` apart, inside
/// `low..=high` as far as there is room; the order is kept.
pub fn spread(wished: &[f64], spacing: f64, low: f64, high: f64) -> Vec<f64> {
    let mut order: Vec<usize> = (0..wished.len()).collect();
    order.sort_by(|a, b| wished[*a].total_cmp(&wished[*b]));
    let gaps = wished.len().saturating_sub(1).max(1) as f64;
    let spacing = spacing.min((high - low) / gaps);
    let mut placed = wished.to_vec();
    let mut floor = low;
    for index in &order {
        placed[*index] = placed[*index].max(floor);
        floor = placed[*index] + spacing;
    }
    let mut ceiling = high;
    for index in order.iter().rev() {
        placed[*index] = placed[*index].min(ceiling);
        ceiling = placed[*index] - spacing;
    }
    placed
}

/// Rows for labels that begin at `starts` (rising) and are `widths` long, so
/// that no label is crossed by another or by the line that hangs from a later
/// one. Row 0 is the uppermost.
pub fn rows(starts: &[f64], widths: &[f64], gap: f64) -> Vec<usize> {
    let mut ends: Vec<f64> = Vec::new();
    let mut rows = Vec::with_capacity(starts.len());
    for (start, width) in starts.iter().zip(widths) {
        let row = ends
            .iter()
            .rposition(|end| end + gap > *start)
            .map_or(0, |busy| busy + 1);
        ends.truncate(row);
        ends.push(start + width);
        rows.push(row);
    }
    rows
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn verify_labels_keep_apart() {
        let placed = spread(&[10.0, 11.0, 95.0, 99.0], 10.0, 0.0, 100.0);
        assert_eq!(placed, vec![10.0, 20.0, 90.0, 100.0]);
        let tight = spread(&[5.0; 21], 10.0, 0.0, 100.0);
        assert!(tight.windows(2).all(|pair| pair[1] - pair[0] > 4.9));
        assert!(spread(&[], 10.0, 0.0, 100.0).is_empty());
    }

    #[test]
    fn verify_rows_do_not_cross() {
        assert_eq!(rows(&[0.0, 5.0, 50.0], &[20.0, 20.0, 20.0], 2.0), [0, 1, 0]);
        // The third would hang through the second if it stood in row 0.
        assert_eq!(rows(&[0.0, 5.0, 22.0], &[20.0, 40.0, 9.0], 1.0), [0, 1, 2]);
    }
}
