//! Labels in a column, moved apart as little as possible so that none lies on another.

/// New places for labels that want to stand at `wanted` (in any order), each at least `gap` from the next,
/// in the same order and with the smallest sum of squared moves (pool adjacent violators).
pub(crate) fn spread(wanted: &[f64], gap: f64) -> Vec<f64> {
    let mut order: Vec<usize> = (0..wanted.len()).collect();
    order.sort_by(|a, b| wanted[*a].total_cmp(&wanted[*b]));
    // With k·gap taken off the k-th, the places need only not fall.
    let mut pools: Vec<(f64, usize)> = vec![];
    for (rank, index) in order.iter().enumerate() {
        let mut pool = (wanted[*index] - gap * count(rank), 1);
        while let Some((mean, size)) = pools.pop_if(|(mean, _)| *mean > pool.0) {
            let total = size + pool.1;
            pool = ((mean * count(size) + pool.0 * count(pool.1)) / count(total), total);
        }
        pools.push(pool);
    }
    let flat = pools.into_iter().flat_map(|(mean, size)| std::iter::repeat_n(mean, size));
    let mut places = vec![0.0; wanted.len()];
    for (rank, (index, place)) in order.into_iter().zip(flat).enumerate() {
        places[index] = place + gap * count(rank);
    }
    places
}

/// A small count as a number.
#[allow(clippy::cast_precision_loss)]
fn count(n: usize) -> f64 {
    n as f64
}

#[cfg(test)]
mod tests {
    use super::spread;

    #[test]
    fn labels_with_room_stay_where_they_are() {
        assert_eq!(spread(&[10.0, 0.0, -10.0], 4.0), vec![10.0, 0.0, -10.0]);
    }

    #[test]
    fn crowded_labels_move_apart_evenly() {
        let places = spread(&[1.0, -1.0, 0.0], 4.0);
        let expected = [4.0, -4.0, 0.0];
        assert!(places.iter().zip(expected).all(|(a, b)| (a - b).abs() < 1e-12), "{places:?}");
    }

    #[test]
    fn pairs_keep_their_middle() {
        let places = spread(&[21.0, 19.0, 1.0, -1.0], 4.0);
        let expected = [22.0, 18.0, 2.0, -2.0];
        assert!(places.iter().zip(expected).all(|(a, b)| (a - b).abs() < 1e-12), "{places:?}");
    }
}
