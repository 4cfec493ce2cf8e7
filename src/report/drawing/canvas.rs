//! The paper a drawing is made on: SVG in mm of paper, y downwards, with the few strokes that drawings need.

use maud::{Markup, PreEscaped, Render, html};

/// A stroke or a fill, drawn the same everywhere; what it looks like stands in [`STYLE`].
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Ink {
    /// A visible edge.
    Edge,
    /// An edge behind something.
    Hidden,
    /// An axis.
    Axis,
    /// Dimension and extension lines.
    Thin,
    /// A plate in view.
    Plate,
    /// A part that is cut.
    Cut,
    /// A bolt.
    Bolt,
    /// A weld.
    Weld,
    /// A force.
    Force,
    /// What governs.
    Governs,
}

impl Ink {
    fn class(self) -> &'static str {
        match self {
            Self::Edge => "edge",
            Self::Hidden => "hidden",
            Self::Axis => "axis",
            Self::Thin => "thin",
            Self::Plate => "plate",
            Self::Cut => "cut",
            Self::Bolt => "bolt",
            Self::Weld => "weld",
            Self::Force => "force",
            Self::Governs => "governs",
        }
    }
}

/// How drawings look: told apart by weight, dash and hatch first, by colour (blue and vermilion, safe for the
/// colour-blind) second.
pub const STYLE: &str = "\
.drawing .edge,.drawing .plate,.drawing .cut,.drawing .bolt{stroke:#000;stroke-width:.35;fill:none}
.drawing .plate{fill:#f2f2f2}.drawing .cut{fill:#cfcfcf}.drawing .bolt{fill:#fff;stroke-width:.3}
.drawing .hidden{stroke:#000;stroke-width:.2;stroke-dasharray:1.6 .8;fill:none}
.drawing .axis{stroke:#000;stroke-width:.15;stroke-dasharray:3 .7 .5 .7;fill:none}
.drawing .thin{stroke:#444;stroke-width:.15;fill:none}
.drawing .weld{fill:#000;stroke:none}
.drawing .force{stroke:#0072b2;stroke-width:.7;fill:#0072b2}
.drawing .governs{stroke:#d55e00;stroke-width:.8;stroke-dasharray:2.4 1;fill:none}
.drawing text{font:2.7px 'DejaVu Sans',Verdana,Arial,sans-serif;fill:#000;paint-order:stroke;stroke:#fff;stroke-width:.8}
.drawing text.title{font-weight:bold}.drawing text.force{fill:#004a75;font-weight:bold;stroke:#fff;stroke-width:.8}
.drawing text.governs{fill:#8f3f00;font-weight:bold;stroke:#fff;stroke-dasharray:none;stroke-width:.8}
";

/// Where a text hangs on its point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Anchor {
    Start,
    Middle,
    End,
}

/// A drawing under way.
#[derive(Default)]
pub(super) struct Canvas {
    out: String,
}

/// A coordinate to a hundredth; never "-0" and never no number.
fn n(value: f64) -> String {
    let rounded = (value * 100.0).round() / 100.0;
    if rounded.is_finite() { (rounded + 0.0).to_string() } else { "0".into() }
}

impl Canvas {
    fn put(&mut self, markup: Markup) {
        markup.render_to(&mut self.out);
        self.out.push('\n');
    }

    pub(super) fn line(&mut self, ink: Ink, from: (f64, f64), to: (f64, f64)) {
        let (x1, y1, x2, y2) = (n(from.0), n(from.1), n(to.0), n(to.1));
        self.put(html! { line class=(ink.class()) x1=(x1) y1=(y1) x2=(x2) y2=(y2) {} });
    }

    /// Between two opposite corners.
    pub(super) fn rect(&mut self, ink: Ink, a: (f64, f64), b: (f64, f64)) {
        let (x, y) = (n(a.0.min(b.0)), n(a.1.min(b.1)));
        let (width, height) = (n((a.0 - b.0).abs()), n((a.1 - b.1).abs()));
        self.put(html! { rect class=(ink.class()) x=(x) y=(y) width=(width) height=(height) {} });
    }

    pub(super) fn circle(&mut self, ink: Ink, at: (f64, f64), radius: f64) {
        self.put(html! { circle class=(ink.class()) cx=(n(at.0)) cy=(n(at.1)) r=(n(radius)) {} });
    }

    pub(super) fn polygon(&mut self, ink: Ink, points: &[(f64, f64)]) {
        let points: Vec<String> = points.iter().map(|(x, y)| format!("{},{}", n(*x), n(*y))).collect();
        self.put(html! { polygon class=(ink.class()) points=(points.join(" ")) {} });
    }

    pub(super) fn text(&mut self, class: &str, anchor: Anchor, at: (f64, f64), text: &str) {
        let anchor = match anchor {
            Anchor::Start => "start",
            Anchor::Middle => "middle",
            Anchor::End => "end",
        };
        self.put(html! { text class=(class) text-anchor=(anchor) x=(n(at.0)) y=(n(at.1)) { (text) } });
    }

    /// A text that stands along the height, read from the right.
    pub(super) fn upright(&mut self, at: (f64, f64), text: &str) {
        let turn = format!("rotate(-90 {} {})", n(at.0), n(at.1));
        self.put(html! { text text-anchor="middle" x=(n(at.0)) y=(n(at.1)) transform=(turn) { (text) } });
    }

    /// An arrow whose head is at `to`, level.
    pub(super) fn arrow(&mut self, ink: Ink, from: (f64, f64), to: (f64, f64)) {
        let back = 2.6 * (to.0 - from.0).signum();
        self.line(ink, from, (to.0 - back, to.1));
        self.polygon(ink, &[to, (to.0 - back, to.1 - 1.1), (to.0 - back, to.1 + 1.1)]);
    }

    /// A line where a part is broken off, from one point to another.
    pub(super) fn broken(&mut self, from: (f64, f64), to: (f64, f64)) {
        let at = |part: f64, aside: f64| {
            let (dx, dy) = (to.0 - from.0, to.1 - from.1);
            let length = dx.hypot(dy).max(f64::MIN_POSITIVE);
            (from.0 + part * dx - aside * dy / length, from.1 + part * dy + aside * dx / length)
        };
        let turns = [from, at(0.45, 0.0), at(0.475, 1.6), at(0.525, -1.6), at(0.55, 0.0), to];
        turns.windows(2).for_each(|pair| self.line(Ink::Thin, pair[0], pair[1]));
    }

    /// The whole drawing with its title and description for those who can't see it; `id` makes theirs unique.
    pub(super) fn finish(self, size: (f64, f64), id: &str, title: &str, desc: &str) -> Markup {
        let (title_id, desc_id) = (format!("{id}-title"), format!("{id}-desc"));
        html! {
            svg xmlns="http://www.w3.org/2000/svg" class="drawing" role="img" aria-labelledby={ (title_id) " " (desc_id) }
                viewBox={ "0 0 " (n(size.0)) " " (n(size.1)) } width={ (n(size.0)) "mm" } height={ (n(size.1)) "mm" } {
                title id=(title_id) { (title) }
                desc id=(desc_id) { (desc) }
                (PreEscaped("\n"))
                (PreEscaped(self.out))
            }
        }
    }
}
