//! Which variants a family has: of a table, or every combination of some values.

use thiserror::Error;

use super::table::Table;
use super::vary::Vary;

/// Most variants of a family.
pub const MOST_VARIANTS: usize = 1_000_000;

/// The variants of a family, in order; each is made when it is asked for.
#[derive(Clone, Debug)]
pub struct Plan {
    keys: Vec<String>,
    variants: Variants,
    /// Digits of the numbers that name variants without a name.
    digits: usize,
}

#[derive(Clone, Debug)]
enum Variants {
    Table(Table),
    Combinations { lists: Vec<Vec<String>>, count: usize },
}

/// One variant: the spec's text with some values in the place of its own.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Variant {
    /// Its place, counted from 1.
    pub index: usize,
    /// What its files are called.
    pub name: String,
    /// Its row in the table, as a spreadsheet counts; none where values were combined.
    pub row: Option<u64>,
    /// A value for each of [`Plan::keys`]; an empty one is the spec's own.
    pub values: Vec<String>,
}

/// Why there is no plan.
#[derive(Clone, Debug, Error, PartialEq, Eq)]
#[non_exhaustive]
pub enum PlanError {
    /// Nothing is varied.
    #[error("nothing is varied: give at least one KEY=LIST")]
    Nothing,
    /// A key twice.
    #[error("{0} is varied twice; put all its values into one list")]
    Twice(String),
    /// Too many combinations.
    #[error("{0} combinations are more than {MOST_VARIANTS}; take fewer values")]
    TooMany(u128),
}

impl Plan {
    /// The variants of a table, one a row.
    pub fn of_table(table: Table) -> Self {
        Self {
            keys: table.keys.clone(),
            digits: digits(table.len()),
            variants: Variants::Table(table),
        }
    }

    /// Every combination of the values of some keys; those of the last key change fastest.
    ///
    /// # Errors
    ///
    /// [`PlanError`] where no key is given, a key is given twice, or there are too many combinations.
    pub fn combinations(varied: Vec<Vary>) -> Result<Self, PlanError> {
        let count = varied
            .iter()
            .map(|vary| vary.values.len() as u128)
            .fold(1, u128::saturating_mul);
        let keys: Vec<String> = varied.iter().map(|vary| vary.key.clone()).collect();
        if let Some(twice) = (1..keys.len()).find(|&i| keys[..i].contains(&keys[i])) {
            return Err(PlanError::Twice(keys[twice].clone()));
        }
        match usize::try_from(count) {
            _ if keys.is_empty() || count == 0 => Err(PlanError::Nothing),
            Ok(few) if few <= MOST_VARIANTS => Ok(Self {
                keys,
                digits: digits(few),
                variants: Variants::Combinations {
                    lists: varied.into_iter().map(|vary| vary.values).collect(),
                    count: few,
                },
            }),
            _ => Err(PlanError::TooMany(count)),
        }
    }

    /// The keys that are varied.
    pub fn keys(&self) -> &[String] {
        &self.keys
    }

    /// Whether a table names its variants in its first column.
    pub(super) fn is_named(&self) -> bool {
        matches!(&self.variants, Variants::Table(table) if table.named)
    }

    /// Number of variants; at least one.
    pub fn count(&self) -> usize {
        match &self.variants {
            Variants::Table(table) => table.len(),
            Variants::Combinations { count, .. } => *count,
        }
    }

    /// The variant at a place, counted from 0.
    ///
    /// # Panics
    ///
    /// Where there are no so many variants.
    pub fn variant(&self, i: usize) -> Variant {
        let number = || format!("{:0digits$}", i + 1, digits = self.digits);
        match &self.variants {
            Variants::Table(table) => Variant {
                index: i + 1,
                name: table.name(i).map_or_else(number, str::to_owned),
                row: Some(table.row(i)),
                values: table.values(i).map(str::to_owned).collect(),
            },
            Variants::Combinations { lists, count } => {
                assert!(i < *count, "variant {i} of {count}");
                let mut rest = i;
                let mut values: Vec<String> = (lists.iter().rev())
                    .map(|list| {
                        let value = list[rest % list.len()].clone();
                        rest /= list.len();
                        value
                    })
                    .collect();
                values.reverse();
                Variant {
                    index: i + 1,
                    name: number(),
                    row: None,
                    values,
                }
            }
        }
    }

    /// A variant's keys and values, without those that are the spec's own.
    pub fn set(&self, variant: &Variant) -> Vec<(String, String)> {
        (self.keys.iter().zip(&variant.values))
            .filter(|(_, value)| !value.is_empty())
            .map(|(key, value)| (key.clone(), value.clone()))
            .collect()
    }
}

/// Digits of the numbers that name `count` variants: at least four, so that names sort as numbers do.
fn digits(count: usize) -> usize {
    count.to_string().len().max(4)
}

#[cfg(test)]
mod tests {
    use super::{Plan, PlanError};
    use crate::family::{Table, Vary};

    fn combinations(lists: &[&str]) -> Result<Plan, PlanError> {
        Plan::combinations(lists.iter().map(|list| Vary::parse(list).unwrap()).collect())
    }

    #[test]
    fn the_last_key_changes_fastest() {
        let plan = combinations(&["planform.aspect_ratio=6,8", "planform.taper_ratio=0.3..0.5/3"]).unwrap();
        assert_eq!(plan.count(), 6);
        let found: Vec<_> = (0..6)
            .map(|i| plan.variant(i))
            .map(|v| (v.name.clone(), v.values.join(" ")))
            .collect();
        let expected = ["6 0.3", "6 0.4", "6 0.5", "8 0.3", "8 0.4", "8 0.5"];
        for (i, values) in expected.iter().enumerate() {
            assert_eq!(found[i], (format!("000{}", i + 1), (*values).to_owned()));
        }
    }

    #[test]
    fn plans_that_are_none() {
        assert_eq!(combinations(&[]).unwrap_err(), PlanError::Nothing);
        assert_eq!(
            combinations(&["planform.span=1,2", "planform.span=3"]).unwrap_err(),
            PlanError::Twice("planform.span".to_owned())
        );
        let many = ["planform.span=1..2/2000", "planform.sweep=1..2/2000"];
        assert_eq!(combinations(&many).unwrap_err(), PlanError::TooMany(4_000_000));
    }

    #[test]
    fn empty_fields_are_the_specs_own() {
        let table = Table::read(b"planform.span,planform.sweep\n1,\n,2\n").unwrap();
        let plan = Plan::of_table(table);
        let set = |i| plan.set(&plan.variant(i));
        assert_eq!(set(0), [("planform.span".to_owned(), "1".to_owned())]);
        assert_eq!(set(1), [("planform.sweep".to_owned(), "2".to_owned())]);
        assert_eq!(
            (plan.variant(1).name.as_str(), plan.variant(1).row),
            ("0002", Some(3))
        );
    }
}
