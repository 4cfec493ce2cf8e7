//! α of EN 1993-1-8:2005 Figure 6.11, for bolt rows next to a stiffener or a flange.

/// λ_1 at which the curve of this α stands at a given λ_2: the closed form of the chart, published in Moore & Wald
/// (eds), *Design of Structural Connections to Eurocode 3 – Frequently Asked Questions*.
pub fn lambda_1_on_curve(alpha: f64, lambda_2: f64) -> f64 {
    let lambda_1_lim = 1.25 / (alpha - 2.75);
    let lambda_2_lim = alpha * lambda_1_lim / 2.0;
    if lambda_2 >= lambda_2_lim {
        lambda_1_lim
    } else {
        let share = (lambda_2_lim - lambda_2) / lambda_2_lim;
        lambda_1_lim + (1.0 - lambda_1_lim) * share.powf(0.185 * alpha.powf(1.785))
    }
}

/// α for λ_1 = m/(m+e) and λ_2 = m_2/(m+e), between the chart's lowest curve (4.45) and `alpha_max` (8 on the chart;
/// some practice stops at 2π). NaN in, NaN out.
pub fn alpha(lambda_1: f64, lambda_2: f64, alpha_max: f64) -> f64 {
    const ALPHA_MIN: f64 = 4.45;
    if !(lambda_1.is_finite() && lambda_2.is_finite()) {
        return f64::NAN;
    }
    let (mut low, mut high) = (ALPHA_MIN, alpha_max);
    if lambda_1 >= lambda_1_on_curve(low, lambda_2) {
        return low;
    }
    if lambda_1 <= lambda_1_on_curve(high, lambda_2) {
        return high;
    }
    // λ_1 falls as α grows, so halving the interval finds the curve; 40 halvings leave 3e-12.
    for _ in 0..40 {
        let middle = 0.5 * (low + high);
        if lambda_1 < lambda_1_on_curve(middle, lambda_2) {
            low = middle;
        } else {
            high = middle;
        }
    }
    low
}

/// α by the formula of a draft of EN 1993-1-8:2024 (the published standard not seen):
/// 4 + 1.67 (e/m) (m/m_2)^0.67, at least 4 + 1.25 e/m, at most 8. NaN in, NaN out.
pub fn alpha_of_draft(lambda_1: f64, lambda_2: f64) -> f64 {
    if !(lambda_1 > 0.0 && lambda_2 > 0.0) {
        return f64::NAN;
    }
    let (e_by_m, m_by_m_2) = (1.0 / lambda_1 - 1.0, lambda_1 / lambda_2);
    let alpha = (4.0 + 1.67 * e_by_m * m_by_m_2.powf(0.67)).max(4.0 + 1.25 * e_by_m);
    alpha.min(8.0)
}
