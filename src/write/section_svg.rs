//! A drawing of a section as SVG: contour, chord line, camber line, nose circle and curvature comb.
//!
//! Lines differ by dash and width, not by colour alone, so that the drawing is legible in black and white.

/// What is drawn, in units of the chord with y up.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct SectionDrawing {
    /// Heading.
    pub title: String,
    /// Points around the section from the upper trailing edge to the lower.
    pub outline: Vec<[f64; 2]>,
    /// Points of the camber line from the nose to the trailing edge.
    pub camber: Vec<[f64; 2]>,
    /// Centre and radius of the circle that fits the nose.
    pub nose: Option<([f64; 2], f64)>,
    /// Teeth of the curvature comb: a point of the contour and the curvature there \[1/chord\], positive where the side
    /// bulges outwards, with the outward direction.
    pub comb: Vec<Tooth>,
    /// Lines of text below the drawing.
    pub notes: Vec<String>,
}

/// A tooth of the curvature comb.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Tooth {
    /// Point of the contour \[chord\].
    pub foot: [f64; 2],
    /// Unit vector outwards.
    pub outwards: [f64; 2],
    /// Curvature, positive where the contour bulges outwards \[1/chord\].
    pub curvature: f64,
}

/// Width of the chord in the drawing, and room around it, in SVG units.
const CHORD: f64 = 1000.0;
const ROOM: f64 = 60.0;
/// Length of a tooth by curvature κ: `TOOTH · asinh(κ)`, so that the nose stays in the picture and a wave is still seen.
const TOOTH: f64 = 0.02;
const LINE: f64 = 22.0;

/// The drawing as an SVG file.
pub fn section_svg(drawing: &SectionDrawing) -> String {
    let teeth: Vec<[[f64; 2]; 2]> = (drawing.comb.iter())
        .map(
            |Tooth {
                 foot,
                 outwards,
                 curvature,
             }| {
                let length = TOOTH * curvature.asinh();
                [
                    *foot,
                    [foot[0] + length * outwards[0], foot[1] + length * outwards[1]],
                ]
            },
        )
        .collect();
    let tips: Vec<[f64; 2]> = teeth.iter().map(|[_, tip]| *tip).collect();
    let all = || drawing.outline.iter().chain(&tips).chain(&drawing.camber);
    let least = |k: usize| all().map(|p| p[k]).fold(0.0, f64::min);
    let most = |k: usize| all().map(|p| p[k]).fold(if k == 0 { 1.0 } else { 0.0 }, f64::max);
    let (left, right, bottom, top) = (least(0), most(0), least(1), most(1));
    let head = ROOM + LINE;
    let place = |p: [f64; 2]| [ROOM + CHORD * (p[0] - left), head + CHORD * (top - p[1])];
    let width = CHORD * (right - left) + 2.0 * ROOM;
    let foot = head + CHORD * (top - bottom) + ROOM;
    let height = foot + LINE * drawing.notes.len() as f64 + 0.5 * ROOM;

    let mut out = String::new();
    let mut push = |text: std::fmt::Arguments<'_>| out.push_str(&text.to_string());
    push(format_args!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {width:.1} {height:.1}\" width=\"{width:.0}\" height=\"{height:.0}\">\n"
    ));
    push(format_args!("<title>{}</title>\n", escaped(&drawing.title)));
    push(format_args!(
        "<rect width=\"100%\" height=\"100%\" fill=\"#ffffff\"/>\n"
    ));
    push(format_args!(
        "<text x=\"{ROOM}\" y=\"{:.1}\" font-family=\"sans-serif\" font-size=\"20\">{}</text>\n",
        0.6 * ROOM,
        escaped(&drawing.title)
    ));
    push(format_args!("<g fill=\"none\" stroke-linejoin=\"round\">\n"));
    if !teeth.is_empty() {
        let path: String = teeth.iter().map(|tooth| path(&tooth.map(place), false)).collect();
        push(format_args!(
            "<path id=\"comb\" d=\"{path}\" stroke=\"#8a8f98\" stroke-width=\"0.6\"/>\n"
        ));
        let tips: Vec<[f64; 2]> = tips.iter().map(|p| place(*p)).collect();
        let tips = self::path(&tips, false);
        push(format_args!(
            "<path id=\"comb-edge\" d=\"{tips}\" stroke=\"#8a8f98\" stroke-width=\"1\"/>\n"
        ));
    }
    let chord = path(&[place([0.0, 0.0]), place([1.0, 0.0])], false);
    push(format_args!(
        "<path id=\"chord\" d=\"{chord}\" stroke=\"#3c4250\" stroke-width=\"0.8\" stroke-dasharray=\"18 4 3 4\"/>\n"
    ));
    let camber: Vec<[f64; 2]> = drawing.camber.iter().map(|p| place(*p)).collect();
    push(format_args!(
        "<path id=\"camber\" d=\"{}\" stroke=\"#a03c14\" stroke-width=\"1.4\" stroke-dasharray=\"9 5\"/>\n",
        path(&camber, false)
    ));
    if let Some((centre, radius)) = drawing.nose {
        let [x, y] = place(centre);
        push(format_args!(
            "<circle id=\"nose\" cx=\"{x:.2}\" cy=\"{y:.2}\" r=\"{:.2}\" stroke=\"#1d5b8f\" stroke-width=\"1\" stroke-dasharray=\"3 3\"/>\n",
            CHORD * radius
        ));
    }
    let outline: Vec<[f64; 2]> = drawing.outline.iter().map(|p| place(*p)).collect();
    push(format_args!(
        "<path id=\"contour\" d=\"{}\" stroke=\"#10151f\" stroke-width=\"2\"/>\n</g>\n",
        path(&outline, true)
    ));
    for (i, note) in drawing.notes.iter().enumerate() {
        push(format_args!(
            "<text x=\"{ROOM}\" y=\"{:.1}\" font-family=\"sans-serif\" font-size=\"15\">{}</text>\n",
            foot + LINE * i as f64,
            escaped(note)
        ));
    }
    push(format_args!("</svg>\n"));
    out
}

/// A path through points.
fn path(points: &[[f64; 2]], closed: bool) -> String {
    let mut out = String::new();
    for (i, [x, y]) in points.iter().enumerate() {
        let command = if i == 0 { 'M' } else { 'L' };
        out.push_str(&format!("{command}{x:.2} {y:.2}"));
    }
    if closed && !points.is_empty() {
        out.push('Z');
    }
    out
}

/// Text as it may stand in XML; control characters, which may not, become spaces.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            c if c.is_control() || matches!(c, '\u{fffe}' | '\u{ffff}') => out.push(' '),
            c => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::{SectionDrawing, Tooth, section_svg};

    #[test]
    fn every_part_is_drawn_in_its_place_and_text_is_escaped() {
        let drawing = SectionDrawing {
            title: "A <b> & c".to_owned(),
            outline: vec![[1.0, 0.01], [0.0, 0.0], [1.0, -0.01]],
            camber: vec![[0.0, 0.0], [1.0, 0.0]],
            nose: Some(([0.02, 0.0], 0.02)),
            comb: vec![Tooth {
                foot: [0.5, 0.005],
                outwards: [0.0, 1.0],
                curvature: 1.0,
            }],
            notes: vec!["area 0.08".to_owned()],
        };
        let svg = section_svg(&drawing);
        assert!(svg.contains("A &lt;b&gt; &amp; c") && !svg.contains("<b>"));
        for id in ["comb", "chord", "camber", "nose", "contour"] {
            assert!(svg.contains(&format!("id=\"{id}\"")), "{id}");
        }
        // the tooth reaches highest, 0.005 + 0.02 asinh 1 above the chord line, which is 82 from the top
        let chord_line = 82.0 + 1000.0 * (0.005 + 0.02 * 1.0_f64.asinh());
        assert!(
            svg.contains(&format!("M60.00 {chord_line:.2}L1060.00 {chord_line:.2}")),
            "{svg}"
        );
        assert!(svg.contains("r=\"20.00\""));
        assert_eq!(svg, section_svg(&drawing));
        assert!(svg.ends_with("</svg>\n"));
    }

    #[test]
    fn an_empty_drawing_is_still_a_file() {
        assert!(section_svg(&SectionDrawing::default()).starts_with("<svg"));
    }
}
