//! For the tests: sections from a formula, and files of every form.

/// A section of the 4-digit kind, thickness square to the camber line; the nose (0, 0) is a point of the curve.
#[derive(Clone, Copy, Debug)]
pub(super) struct Form {
    pub(super) thickness: f64,
    pub(super) camber: f64,
    pub(super) camber_at: f64,
    /// Whether the trailing edge has its base of 2.1 % of the thickness.
    pub(super) open: bool,
}

impl Form {
    /// The point of the upper (`s` > 0) or lower side at the chord fraction `s * s`.
    pub(super) fn point(&self, s: f64) -> [f64; 2] {
        let x = s * s;
        let (m, p) = (self.camber, self.camber_at);
        let last = if self.open { -0.1015 } else { -0.1036 };
        let half = 5.0
            * self.thickness
            * (0.2969 * s.abs() + x * (-0.1260 + x * (-0.3516 + x * (0.2843 + x * last))));
        let (y, slope) = if x < p {
            (m / (p * p) * (2.0 * p * x - x * x), 2.0 * m / (p * p) * (p - x))
        } else {
            let q = m / ((1.0 - p) * (1.0 - p));
            (q * (1.0 - 2.0 * p + 2.0 * p * x - x * x), 2.0 * q * (p - x))
        };
        let norm = slope.hypot(1.0);
        let half = half * s.signum();
        [x - half * slope / norm, y + half / norm]
    }

    /// From the upper trailing edge to the lower one; `stations` are fractions of s between nose and trailing edge,
    /// each side its own.
    pub(super) fn contour(&self, upper: &[f64], lower: &[f64]) -> Vec<[f64; 2]> {
        let mut points = vec![self.point(1.0)];
        points.extend(upper.iter().rev().map(|&s| self.point(s)));
        points.push([0.0, 0.0]);
        points.extend(lower.iter().map(|&s| self.point(-s)));
        points.push(self.point(-1.0));
        if !self.open {
            let last = points.len() - 1;
            points[0] = [1.0, 0.0];
            points[last] = [1.0, 0.0];
        }
        points
    }

    /// The point of the curve farthest from (1, 0), and its distance: by trial of s, then bisection of the interval.
    pub(super) fn farthest(&self) -> [f64; 2] {
        let distance = |s: f64| {
            let [x, y] = self.point(s);
            (x - 1.0).hypot(y)
        };
        let (mut low, mut high) = (-0.2, 0.2);
        for _ in 0..200 {
            let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
            if distance(a) > distance(b) {
                high = b
            } else {
                low = a
            }
        }
        self.point(0.5 * (low + high))
    }
}

/// `n` stations between nose and trailing edge: even in s, each moved by up to `jitter` of its step by the numbers given.
pub(super) fn stations(n: usize, jitter: &[f64]) -> Vec<f64> {
    (1..=n)
        .map(|i| (i as f64 + jitter[i % jitter.len()]) / (n as f64 + 1.0))
        .collect()
}

/// The public layouts and what else is found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Layout {
    Loop,
    LoopFromNose,
    Counted,
    Blocks,
    BlocksFromEdge,
}

/// How a file is written.
#[derive(Clone, Debug)]
pub(super) struct Style {
    pub(super) layout: Layout,
    pub(super) lower_first: bool,
    pub(super) scale: f64,
    /// 0 plain, 1 without leading zero, 2 exponent E, 3 exponent D, 4 with plus sign, 5 trailing zeros cut.
    pub(super) print: usize,
    pub(super) separator: &'static str,
    pub(super) decimal_comma: bool,
    pub(super) end: &'static str,
    pub(super) title: Option<&'static str>,
    /// 0 UTF-8, 1 with mark, 2 UTF-16 LE, 3 UTF-16 BE, 4 Latin-1.
    pub(super) encoding: usize,
    pub(super) remarks: bool,
    pub(super) blanks: bool,
    pub(super) repeats: bool,
    /// 0 none, 1 zero behind, 2 running number before.
    pub(super) third: usize,
    pub(super) turn: f64,
    pub(super) shift: [f64; 2],
}

pub(super) const PLAIN: Style = Style {
    layout: Layout::Loop,
    lower_first: false,
    scale: 1.0,
    print: 0,
    separator: " ",
    decimal_comma: false,
    end: "\n",
    title: Some("Plover 12"),
    encoding: 0,
    remarks: false,
    blanks: false,
    repeats: false,
    third: 0,
    turn: 0.0,
    shift: [0.0; 2],
};

/// Decimals printed.
pub(super) const DECIMALS: usize = 8;

fn number(value: f64, style: &Style) -> String {
    let plain = format!("{value:.DECIMALS$}");
    let text = match style.print {
        1 => plain.replacen("0.", ".", usize::from(value.abs() < 1.0)),
        2 => format!("{value:.10E}"),
        3 => format!("{value:.10e}").replace('e', "D"),
        4 if value > 0.0 => format!("+{plain}"),
        5 => plain.trim_end_matches('0').to_owned(),
        _ => plain,
    };
    if style.decimal_comma {
        text.replace('.', ",")
    } else {
        text
    }
}

/// The bytes of a file that holds `points`, with the nose at index `nose`.
pub(super) fn file(points: &[[f64; 2]], nose: usize, style: &Style) -> Vec<u8> {
    let (s, c) = style.turn.sin_cos();
    let put = |p: &[f64; 2]| {
        let q = [
            p[0] * c - p[1] * s + style.shift[0],
            p[0] * s + p[1] * c + style.shift[1],
        ];
        q.map(|v| v * style.scale)
    };
    let all: Vec<[f64; 2]> = points.iter().map(put).collect();
    let mut upper: Vec<[f64; 2]> = all[..=nose].to_vec();
    let mut lower: Vec<[f64; 2]> = all[nose..].to_vec();
    let mut blocks = match style.layout {
        Layout::Loop => {
            let mut run = all.clone();
            if style.lower_first {
                run.reverse();
            }
            vec![run]
        }
        Layout::LoopFromNose => {
            upper.reverse();
            lower.reverse();
            if upper.last() == lower.first() {
                lower.remove(0);
            }
            let mut run = [upper, lower].concat();
            if style.lower_first {
                run.reverse();
            }
            vec![run]
        }
        Layout::Counted | Layout::Blocks => {
            upper.reverse();
            vec![upper, lower]
        }
        Layout::BlocksFromEdge => {
            lower.reverse();
            vec![upper, lower]
        }
    };
    if style.lower_first && blocks.len() == 2 {
        blocks.reverse();
    }
    if style.repeats && style.layout != Layout::Counted {
        for block in &mut blocks {
            let k = block.len() / 2;
            block.insert(k, block[k]);
            block.insert(1, block[0]);
        }
    }
    let mut lines: Vec<String> = Vec::new();
    lines.extend(style.title.map(str::to_owned));
    if style.layout == Layout::Counted {
        lines.push(format!(
            "{}{}{}",
            blocks[0].len(),
            style.separator,
            blocks[1].len()
        ));
    }
    let mut running = 0;
    for block in &blocks {
        if style.blanks {
            lines.push(String::new());
        }
        for p in block {
            running += 1;
            let [x, y] = p.map(|v| number(v, style));
            let sep = style.separator;
            let mut line = match style.third {
                1 => format!("{x}{sep}{y}{sep}{}", number(0.0, style)),
                2 => format!("{running}{sep}{x}{sep}{y}"),
                _ => format!("{x}{sep}{y}"),
            };
            if style.remarks && running % 5 == 2 {
                lines.push("# a remark 1.0 2.0".to_owned());
                line.push_str(" ! measured");
            }
            lines.push(line);
        }
    }
    let text = lines.join(style.end) + style.end;
    let wide = |text: &str, unit: fn(u16) -> [u8; 2]| {
        std::iter::once(0xfeff)
            .chain(text.encode_utf16())
            .flat_map(unit)
            .collect()
    };
    match style.encoding {
        1 => ("\u{feff}".to_owned() + &text).into_bytes(),
        2 => wide(&text, u16::to_le_bytes),
        3 => wide(&text, u16::to_be_bytes),
        4 => text
            .chars()
            .map(|c| u8::try_from(u32::from(c)).unwrap())
            .collect(),
        _ => text.into_bytes(),
    }
}
