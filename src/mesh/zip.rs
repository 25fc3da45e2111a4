//! Facets between two chains of corners.

/// Facets between a left and a right chain.
#[derive(Debug)]
pub(super) struct Zipped {
    /// True where the left chain goes on: facet (left i, left i + 1, right j); else (left i, right j + 1, right j).
    pub(super) left: Vec<bool>,
    /// Largest of the second figures of the edges across.
    pub(super) most: f64,
}

/// Zips chains from places `from` to places `to`. `cost` judges the edge across from a left to a right place by two
/// figures, or `None` where the facet that leads to it (from the places given first) must not be; of the two facets that
/// are possible at each step the one is taken of which the first figure is less. `None` where no facet is possible.
pub(super) fn zip(
    from: (usize, usize),
    to: (usize, usize),
    mut cost: impl FnMut((usize, usize), (usize, usize)) -> Option<[f64; 2]>,
) -> Option<Zipped> {
    let mut here = from;
    let mut zipped = Zipped {
        left: Vec::with_capacity(to.0 + to.1 - from.0 - from.1),
        most: 0.0,
    };
    while here != to {
        let by_left = (here.0 < to.0)
            .then(|| cost(here, (here.0 + 1, here.1)))
            .flatten();
        let by_right = (here.1 < to.1)
            .then(|| cost(here, (here.0, here.1 + 1)))
            .flatten();
        let left = match (by_left, by_right) {
            (Some(a), Some(b)) => a[0] <= b[0],
            (Some(_), None) => true,
            (None, Some(_)) => false,
            (None, None) => return None,
        };
        if left {
            here.0 += 1;
        } else {
            here.1 += 1;
        }
        zipped.left.push(left);
        let taken = if left { by_left } else { by_right };
        zipped.most = zipped.most.max(taken.map_or(0.0, |figures| figures[1]));
    }
    Some(zipped)
}

impl Zipped {
    /// The facets as corner numbers.
    pub(super) fn facets<'a>(
        &'a self,
        from: (usize, usize),
        left: &'a [u32],
        right: &'a [u32],
    ) -> impl Iterator<Item = [u32; 3]> + 'a {
        let (mut i, mut j) = from;
        self.left.iter().map(move |by_left| {
            if *by_left {
                i += 1;
                [left[i - 1], left[i], right[j]]
            } else {
                j += 1;
                [left[i], right[j], right[j - 1]]
            }
        })
    }
}
