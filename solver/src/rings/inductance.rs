//! Mutual inductance of two coaxial rings of rectangular section, averaged over both; of a ring with itself, its self-inductance.
//!
//! The average over four coordinates is one over r, d = r - r' and zeta = z - z' with the piecewise linear weight that two boxes
//! leave; the logarithm at d = zeta = 0 is met by halving panels towards it. Relative accuracy about 1e-8.

use super::cell::Span;
use super::loops::mutual_inductance;
use super::points::GaussRule;

/// Halvings towards the logarithm, of either side in turn: what is left is 2^-36 of the section.
const DEEPEST: u32 = 36;

/// Quadrature rules, made once.
#[derive(Debug, Clone)]
pub(super) struct Averager {
    fine: GaussRule,
    radial: GaussRule,
}

/// A rectangle in (d, zeta).
#[derive(Clone, Copy)]
struct Panel {
    d: Span,
    zeta: Span,
}

impl Averager {
    pub fn new() -> Self {
        Self { fine: GaussRule::new(6), radial: GaussRule::new(4) }
    }

    /// Average of M over the sections (`ra` x `za`) and (`rb` x `zb`), H.
    pub fn mutual(&self, ra: Span, za: Span, rb: Span, zb: Span) -> f64 {
        let scale = ra.width() * rb.width() * za.width() * zb.width();
        let ds = kinks(ra, rb);
        let zetas = kinks(za, zb);
        let mut sum = 0.0;
        for d in ds.windows(2) {
            for zeta in zetas.windows(2) {
                let panel = Panel { d: Span { from: d[0], to: d[1] }, zeta: Span { from: zeta[0], to: zeta[1] } };
                sum += self.panel(panel, ra, za, rb, zb, 0);
            }
        }
        sum / scale
    }

    fn panel(&self, panel: Panel, ra: Span, za: Span, rb: Span, zb: Span, depth: u32) -> f64 {
        if depth < DEEPEST && panel.is_near_origin() {
            return panel.halves().map(|half| self.panel(half, ra, za, rb, zb, depth + 1)).iter().sum();
        }
        let mut sum = 0.0;
        for (d, weight_d) in self.fine.on(panel.d.from, panel.d.to) {
            let r_range = overlap(ra, rb, d);
            for (zeta, weight_z) in self.fine.on(panel.zeta.from, panel.zeta.to) {
                let weight = weight_d * weight_z * overlap(za, zb, zeta).width();
                for (r, weight_r) in self.radial.on(r_range.from, r_range.to) {
                    sum += weight * weight_r * mutual_inductance(r, r - d, zeta);
                }
            }
        }
        sum
    }
}

impl Panel {
    /// Both halves of the longer side.
    fn halves(self) -> [Self; 2] {
        let Self { d, zeta } = self;
        if d.width() > zeta.width() {
            [
                Self { d: Span { from: d.from, to: d.middle() }, zeta },
                Self { d: Span { from: d.middle(), to: d.to }, zeta },
            ]
        } else {
            let (low, high) = (Span { from: zeta.from, to: zeta.middle() }, Span { from: zeta.middle(), to: zeta.to });
            [Self { d, zeta: low }, Self { d, zeta: high }]
        }
    }

    /// Whether the logarithm at (0, 0) lies too near for the rule.
    fn is_near_origin(self) -> bool {
        let reach = |s: Span| (s.from).max(-s.to).max(0.0);
        reach(self.d).hypot(reach(self.zeta)) < 0.6 * self.d.width().max(self.zeta.width())
    }
}

/// Self-inductance of one turn of rectangular section with an even current, H.
#[must_use]
pub fn self_inductance(radii_m: (f64, f64), length_m: f64) -> f64 {
    let r = Span { from: radii_m.0, to: radii_m.1 };
    let z = Span { from: 0.0, to: length_m };
    Averager::new().mutual(r, z, r, z)
}

/// Where the difference of two numbers, one from each span, changes the form of its weight; 0 included where it lies between.
fn kinks(a: Span, b: Span) -> Vec<f64> {
    let mut kinks = vec![a.from - b.to, a.from - b.from, a.to - b.to, a.to - b.from];
    if kinks[0] < 0.0 && kinks[3] > 0.0 {
        kinks.push(0.0);
    }
    kinks.sort_by(f64::total_cmp);
    let least = 1e-9 * (a.width() + b.width());
    kinks.dedup_by(|y, x| (*y - *x).abs() < least);
    kinks
}

/// Those numbers of `a` whose difference to a number of `b` is `difference`.
fn overlap(a: Span, b: Span, difference: f64) -> Span {
    Span { from: a.from.max(b.from + difference), to: a.to.min(b.to + difference) }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// Cutting a ring in four and adding all mutual averages must give the same flux.
    #[test]
    fn averages_add_up() {
        let averager = Averager::new();
        let (r, z) = (Span { from: 0.010, to: 0.012 }, Span { from: 0.0, to: 0.003 });
        let whole = averager.mutual(r, z, r, z);
        let rs = [Span { from: 0.010, to: 0.0107 }, Span { from: 0.0107, to: 0.012 }];
        let zs = [Span { from: 0.0, to: 0.0011 }, Span { from: 0.0011, to: 0.003 }];
        let mut sum = 0.0;
        for ra in rs {
            for za in zs {
                for rb in rs {
                    for zb in zs {
                        let share = ra.width() * za.width() * rb.width() * zb.width();
                        sum += averager.mutual(ra, za, rb, zb) * share;
                    }
                }
            }
        }
        sum /= (r.width() * z.width()).powi(2);
        assert_relative_eq!(sum, whole, max_relative = 1e-8);
    }
}
