//! B-splines of any degree, rational or not, evaluated by the definition of the basis functions.
//!
//! Reference: L. Piegl and W. Tiller, *The NURBS Book*, 2nd ed., Springer 1997, equations 2.5, 2.7, 4.1 and 4.11. This is
//! apart from the splines that wings are made with, so that a file is not measured by what wrote it.

use nalgebra::{Point3, Vector3, Vector4};

/// Degree and knots.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Knots {
    degree: usize,
    values: Vec<f64>,
}

impl Knots {
    /// Knots from multiplicities and distinct values, for a number of control points.
    ///
    /// # Errors
    ///
    /// What does not fit.
    pub(super) fn new(
        degree: usize,
        multiplicities: &[usize],
        distinct: &[f64],
        points: usize,
    ) -> Result<Self, String> {
        if degree == 0 || degree > 60 {
            return Err(format!("degree {degree} is not read; 1 to 60 are"));
        }
        if multiplicities.len() != distinct.len() {
            return Err(format!(
                "{} multiplicities for {} knots",
                multiplicities.len(),
                distinct.len()
            ));
        }
        if let Some(pair) = distinct.windows(2).find(|pair| pair[0] >= pair[1]) {
            return Err(format!("the knots {:?} and {:?} do not ascend", pair[0], pair[1]));
        }
        let sum: usize = multiplicities.iter().sum();
        if sum != points + degree + 1 {
            return Err(format!(
                "{sum} knots for {points} control points of degree {degree}; {} are needed",
                points + degree + 1
            ));
        }
        if multiplicities.iter().any(|&m| m == 0 || m > degree + 1) {
            return Err(format!(
                "a knot's multiplicity is not between 1 and {}",
                degree + 1
            ));
        }
        let values: Vec<f64> = (multiplicities.iter().zip(distinct))
            .flat_map(|(&m, &knot)| std::iter::repeat_n(knot, m))
            .collect();
        Ok(Self { degree, values })
    }

    pub(super) fn degree(&self) -> usize {
        self.degree
    }

    /// True where the spline begins and ends in its first and last control point.
    pub(super) fn is_clamped(&self) -> bool {
        let (n, p) = (self.values.len(), self.degree);
        let same = |run: &[f64]| run.iter().all(|knot| knot.total_cmp(&run[0]).is_eq());
        same(&self.values[..=p]) && same(&self.values[n - p - 1..])
    }

    /// First and last parameter.
    pub(super) fn range(&self) -> (f64, f64) {
        (
            self.values[self.degree],
            self.values[self.values.len() - 1 - self.degree],
        )
    }

    /// The distinct knots in the range.
    pub(super) fn corners(&self) -> Vec<f64> {
        let mut corners = self.values[self.degree..self.values.len() - self.degree].to_vec();
        corners.dedup();
        corners
    }

    /// A parameter from a fraction of the range.
    pub(super) fn at_fraction(&self, fraction: f64) -> f64 {
        let (start, end) = self.range();
        start + (end - start) * fraction
    }

    /// Index of the first basis function that is not zero at `t`, and value and slope of those that are not.
    pub(super) fn basis(&self, t: f64) -> (usize, Vec<[f64; 2]>) {
        let p = self.degree;
        let knots = &self.values;
        let last = knots.len() - p - 2;
        let span = p + knots[p + 1..=last].partition_point(|&knot| knot <= t);
        let mut values = Vec::with_capacity(p + 1);
        values.push(1.0);
        for level in 1..p {
            raise(knots, span, level, t, &mut values);
        }
        let lower = values.clone();
        raise(knots, span, p, t, &mut values);
        // slope of N(i,p): p (N(i,p-1) / (t(i+p) - t(i)) - N(i+1,p-1) / (t(i+p+1) - t(i+1)))
        let part = |k: usize| part_at(&lower, knots, span, p, k);
        let slope = |i: usize| (if i > 0 { part(i - 1) } else { 0.0 }) - (if i < p { part(i) } else { 0.0 });
        let both = (0..=p).map(|i| [values[i], slope(i)]).collect();
        (span - p, both)
    }
}

/// p N / (width of its support), for the `k`-th of the functions of degree p - 1 that are not zero.
fn part_at(lower: &[f64], knots: &[f64], span: usize, p: usize, k: usize) -> f64 {
    let first = span + k + 1 - p;
    lower[k] * p as f64 / (knots[first + p] - knots[first])
}

/// Functions of degree `level` from those of `level - 1`, in place.
fn raise(knots: &[f64], span: usize, level: usize, t: f64, values: &mut Vec<f64>) {
    values.push(0.0);
    // from the last, so that each is read before it is written over
    for k in (0..level).rev() {
        // support of this function of degree level - 1 begins at its first knot
        let first = span + k + 1 - level;
        let share = (t - knots[first]) / (knots[first + level] - knots[first]);
        let value = values[k];
        values[k + 1] += share * value;
        values[k] = (1.0 - share) * value;
    }
}

/// A point and its weight in homogeneous coordinates.
pub(super) fn weighted(point: Point3<f64>, weight: f64) -> Vector4<f64> {
    (point.coords * weight).push(weight)
}

fn sum<'a>(basis: &[[f64; 2]], points: impl Iterator<Item = &'a Vector4<f64>>) -> [Vector4<f64>; 2] {
    let mut sums = [Vector4::zeros(); 2];
    for ([value, slope], point) in basis.iter().zip(points) {
        sums[0] += point * *value;
        sums[1] += point * *slope;
    }
    sums
}

/// A point and derivative from homogeneous ones (quotient rule).
fn project(h: &Vector4<f64>, slope: &Vector4<f64>) -> (Point3<f64>, Vector3<f64>) {
    let point = h.xyz() / h.w;
    (point.into(), (slope.xyz() - point * slope.w) / h.w)
}

/// A curve.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Curve {
    pub(super) knots: Knots,
    pub(super) points: Vec<Vector4<f64>>,
    pub(super) rational: bool,
}

impl Curve {
    /// Point and derivative at a parameter.
    pub(super) fn at(&self, t: f64) -> (Point3<f64>, Vector3<f64>) {
        let (first, basis) = self.knots.basis(t);
        let [h, slope] = sum(&basis, self.points[first..].iter());
        project(&h, &slope)
    }
}

/// A surface; `net[i][j]` goes with the i-th function in u and the j-th in v.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Surface {
    pub(super) u: Knots,
    pub(super) v: Knots,
    pub(super) net: Vec<Vec<Vector4<f64>>>,
    pub(super) rational: bool,
}

impl Surface {
    /// Points and derivatives over u of the control points of the curve along v at `u`.
    pub(super) fn across(&self, u: f64) -> Vec<[Vector4<f64>; 2]> {
        let (first, basis) = self.u.basis(u);
        let column = |j: usize| sum(&basis, self.net[first..].iter().map(move |row| &row[j]));
        (0..self.net[0].len()).map(column).collect()
    }

    /// Point and the derivatives over u and v at `v` of a curve from [`Surface::across`].
    pub(super) fn along(
        &self,
        across: &[[Vector4<f64>; 2]],
        v: f64,
    ) -> (Point3<f64>, Vector3<f64>, Vector3<f64>) {
        let (first, basis) = self.v.basis(v);
        let (mut h, mut du, mut dv) = (Vector4::zeros(), Vector4::zeros(), Vector4::zeros());
        for ([value, slope], [point, over_u]) in basis.iter().zip(&across[first..]) {
            h += point * *value;
            du += over_u * *value;
            dv += point * *slope;
        }
        let (point, u) = project(&h, &du);
        (point, u, project(&h, &dv).1)
    }

    /// Its four border curves: u at its start, u at its end (both along v), v at its start, v at its end (along u).
    pub(super) fn sides(&self) -> [Curve; 4] {
        let last = self.net.len() - 1;
        let end = self.net[0].len() - 1;
        let along_v = |i: usize| (self.v.clone(), self.net[i].clone());
        let along_u = |j: usize| (self.u.clone(), self.net.iter().map(|row| row[j]).collect());
        [along_v(0), along_v(last), along_u(0), along_u(end)].map(|(knots, points)| Curve {
            knots,
            points,
            rational: self.rational,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::{Curve, Knots, weighted};
    use nalgebra::Point3;

    #[test]
    fn a_rational_quarter_circle_is_one() {
        let half = std::f64::consts::FRAC_1_SQRT_2;
        let curve = Curve {
            knots: Knots::new(2, &[3, 3], &[0.0, 2.0], 3).unwrap(),
            points: vec![
                weighted(Point3::new(1.0, 0.0, 0.0), 1.0),
                weighted(Point3::new(1.0, 1.0, 0.0), half),
                weighted(Point3::new(0.0, 1.0, 0.0), 1.0),
            ],
            rational: true,
        };
        for i in 0..=20 {
            let (p, d) = curve.at(f64::from(i) / 10.0);
            // x² + y² = 1, and the tangent is square to the radius
            assert!((p.coords.norm() - 1.0).abs() < 1e-15 && p.coords.dot(&d).abs() < 1e-15);
        }
    }

    #[test]
    fn slopes_are_those_of_the_values() {
        let knots = Knots::new(4, &[5, 1, 2, 5], &[0.0, 0.3, 0.7, 1.0], 8).unwrap();
        for t in [0.0_f64, 0.1, 0.3, 0.5, 0.7, 0.9] {
            let (first, at) = knots.basis(t);
            let (ahead, next) = knots.basis(t + 1e-7);
            assert!((at.iter().map(|b| b[0]).sum::<f64>() - 1.0).abs() < 1e-14);
            assert!(at.iter().map(|b| b[1]).sum::<f64>().abs() < 1e-12);
            for (i, [value, slope]) in at.iter().enumerate() {
                let later = (first + i)
                    .checked_sub(ahead)
                    .and_then(|k| next.get(k))
                    .map_or(0.0, |b| b[0]);
                assert!(((later - value) / 1e-7 - slope).abs() < 1e-4, "{t} {i}");
            }
        }
    }

    #[test]
    fn knots_that_fit_no_spline_are_refused_with_the_reason() {
        for (m, knots, points, reason) in [
            (vec![3, 3], vec![0.0, 1.0], 4, "6 knots for 4"),
            (vec![3, 3], vec![1.0, 1.0], 3, "do not ascend"),
            (vec![3], vec![0.0, 1.0], 3, "1 multiplicities for 2"),
            (vec![2, 4], vec![0.0, 1.0], 3, "between 1 and 3"),
        ] {
            let fault = Knots::new(2, &m, &knots, points).unwrap_err();
            assert!(fault.contains(reason), "{fault}");
        }
    }
}
