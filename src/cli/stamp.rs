//! The time stamp of files: never the clock's.

use super::failure::Failure;
use crate::wing::Options;

/// SOURCE_DATE_EPOCH (seconds since 1970, the convention of reproducible builds) as ISO 8601 in UTC, else a fixed date.
///
/// # Errors
///
/// [`Failure::Epoch`] where the variable is set to something else.
pub(super) fn time_stamp() -> Result<String, Failure> {
    match std::env::var_os("SOURCE_DATE_EPOCH") {
        None => Ok(Options::UNDATED.to_owned()),
        Some(value) => {
            let text = value.to_string_lossy().into_owned();
            let seconds = text
                .parse::<u64>()
                .ok()
                .filter(|seconds| *seconds <= 253_402_300_799);
            seconds.map(iso).ok_or(Failure::Epoch(text))
        }
    }
}

/// Civil date and time of a count of seconds since 1970, by counting days in 400-year cycles that begin in March.
fn iso(seconds: u64) -> String {
    let (days, rest) = (seconds / 86_400, seconds % 86_400);
    let shifted = days + 719_468; // days since 0000-03-01
    let (cycle, day) = (shifted / 146_097, shifted % 146_097);
    let year = (day - day / 1_460 + day / 36_524 - day / 146_096) / 365;
    let day_of_year = day - (365 * year + year / 4 - year / 100);
    let month = (5 * day_of_year + 2) / 153; // from March
    let day = day_of_year - (153 * month + 2) / 5 + 1;
    let month = if month < 10 { month + 3 } else { month - 9 };
    let year = cycle * 400 + year + u64::from(month <= 2);
    format!(
        "{year:04}-{month:02}-{day:02}T{:02}:{:02}:{:02}",
        rest / 3_600,
        rest / 60 % 60,
        rest % 60
    )
}

#[cfg(test)]
mod tests {
    use super::iso;

    #[test]
    fn seconds_become_dates() {
        // values from GNU date, `date -u -d @N +%FT%T`
        for (seconds, text) in [
            (0, "1970-01-01T00:00:00"),
            (951_782_400, "2000-02-29T00:00:00"),
            (1_709_251_199, "2024-02-29T23:59:59"),
            (4_107_542_400, "2100-03-01T00:00:00"),
            (253_402_300_799, "9999-12-31T23:59:59"),
        ] {
            assert_eq!(iso(seconds), text);
        }
    }
}
