//! Openings, wind and fans in words.

use super::super::hand;
use super::{clock, side, widest};
use crate::plan::{
    Effect, FanKind, GIVES_WAY, Opening, OpeningId, OpeningKind, Plan, Space, Watched,
};
use crate::units::{Dimension, rounded};
use std::fmt::Write as _;

pub(super) fn openings(out: &mut String, plan: &Plan) {
    line!(
        out,
        "\nOPENINGS (air that can burn through, hand calculation: 1500 A sqrt(H) kW)"
    );
    let moved = || {
        plan.openings
            .iter()
            .enumerate()
            .filter(|(_, opening)| opening.kind != OpeningKind::Gap)
    };
    let widest = widest(moved().map(|(_, opening)| opening.name.as_str()));
    for (index, opening) in moved() {
        let size = if opening.kind.is_horizontal() {
            lying(opening)
        } else {
            upright(opening)
        };
        line!(out, "  {:widest$}  {size}", opening.name);
        line!(
            out,
            "  {:widest$}  {} to {}{}",
            "",
            side(plan, opening.from),
            side(plan, opening.to),
            gives_way(plan, OpeningId(index), opening),
        );
    }
    if moved().next().is_none() {
        line!(out, "  none");
    }
    gaps(out, plan);
}

fn upright(opening: &Opening) -> String {
    let height = opening.head - opening.sill;
    let factor = |width| hand::opening_factor(width, height);
    let megawatts = |width| hand::air_limit(factor(width)) / 1e6;
    let now = if opening.kind == OpeningKind::Division {
        "; always open".to_owned()
    } else if opening.clear_width <= 0.0 {
        format!(" when open; now shut, gap {:.4} m2", opening.gap_area)
    } else if opening.clear_width < opening.width {
        format!(
            " when open; now {:.2} m clear, {:.2} MW",
            opening.clear_width,
            megawatts(opening.clear_width)
        )
    } else {
        " when open; now open".to_owned()
    };
    format!(
        "{:.2} x {height:.2} m  A sqrt(H) {:.2} m5/2  {:.2} MW{now}",
        opening.width,
        factor(opening.width),
        megawatts(opening.width),
    )
}

fn lying(opening: &Opening) -> String {
    let now = if opening.kind == OpeningKind::Stair {
        "always open".to_owned()
    } else if opening.clear_width <= 0.0 {
        format!("now shut, gap {:.4} m2", opening.gap_area)
    } else {
        let open = opening.area * opening.clear_width / opening.width;
        format!("now {open:.2} m2 open")
    };
    let kind = if opening.kind == OpeningKind::Stair {
        "stair"
    } else {
        "hatch"
    };
    format!("{kind} of {:.2} m2; {now}", opening.area)
}

/// When glass falls out or a door fails.
fn gives_way(plan: &Plan, id: OpeningId, opening: &Opening) -> String {
    let mine = |effect: &Effect| effect.opening() == Some(id);
    let mut when: Vec<String> = Vec::new();
    let mut verb = GIVES_WAY[0];
    let mut delay = 0.0;
    for trigger in &plan.triggers {
        if !trigger.only_widens || !mine(&trigger.effect) {
            continue;
        }
        verb = &trigger.what;
        delay = trigger.delay;
        let words = match trigger.watched {
            Watched::UpperTemperature(_) => {
                format!(
                    "at {} of the layer",
                    rounded(trigger.level, Dimension::Temperature)
                )
            }
            _ => format!(
                "when the pane is {} warmer",
                rounded(trigger.level, Dimension::TemperatureDifference)
            ),
        };
        if !when.contains(&words) {
            when.push(words);
        }
    }
    for action in &plan.actions {
        if GIVES_WAY.contains(&action.what.as_str()) && mine(&action.effect) {
            verb = &action.what;
            when.push(format!("at {}", clock(action.time)));
        }
    }
    let glass = opening
        .pane
        .as_ref()
        .map_or_else(String::new, |pane| format!("; glass {}", pane.name));
    if when.is_empty() {
        return match opening.pane {
            Some(_) => format!("{glass}, holds"),
            None => String::new(),
        };
    }
    let delay = if delay > 0.0 {
        format!(", {} later", rounded(delay, Dimension::Time))
    } else {
        String::new()
    };
    let joint = if glass.is_empty() { "; " } else { ", " };
    format!(
        "{glass}{joint}{verb} {}{delay} (uncertain by nature)",
        when.join(" or ")
    )
}

fn gaps(out: &mut String, plan: &Plan) {
    let leak: f64 = plan
        .openings
        .iter()
        .filter(|opening| opening.from == Space::OpenAir || opening.to == Space::OpenAir)
        .map(|opening| {
            let open = if opening.width > 0.0 {
                opening.clear_width / opening.width
            } else {
                0.0
            };
            opening.gap_area * (1.0 - open)
        })
        .sum();
    line!(
        out,
        "  gaps to the open air at ignition: {leak:.3} m2 (orifice area), about {:.0} kW by the same rule",
        plan.rooms
            .first()
            .map_or(0.0, |room| 1500.0 * leak * room.height.sqrt())
    );
}

/// Wind pressures, where there are any.
pub(super) fn wind(out: &mut String, plan: &Plan) {
    let pressed = || {
        plan.openings
            .iter()
            .filter(|opening| opening.wind_pressure != 0.0)
    };
    if pressed().next().is_none() {
        return;
    }
    line!(out, "\nWIND (steady; pressure on the outer face)");
    let widest = widest(pressed().map(|opening| opening.name.as_str()));
    for opening in pressed() {
        line!(
            out,
            "  {:widest$}  {:+.1} Pa",
            opening.name,
            opening.wind_pressure
        );
    }
}

/// Fans, where there are any.
pub(super) fn fans(out: &mut String, plan: &Plan) {
    if plan.fans.is_empty() {
        return;
    }
    line!(
        out,
        "\nFANS (straight net curve from free flow to dead-end pressure)"
    );
    let widest = widest(plan.fans.iter().map(|fan| fan.name.as_str()));
    for fan in &plan.fans {
        let what = match fan.kind {
            FanKind::PositivePressure { opening, covers } => format!(
                "positive pressure at {}, covers {:.0} % of it",
                plan.openings.get(opening.0).map_or("", |o| o.name.as_str()),
                covers * 100.0
            ),
            FanKind::Duct {
                from,
                intake,
                to,
                outlet,
            } => format!(
                "from {} (at {intake:.2} m) to {} (at {outlet:.2} m)",
                side(plan, from),
                side(plan, to)
            ),
        };
        let now = if fan.running { "runs" } else { "stands still" };
        line!(
            out,
            "  {:widest$}  {what}; {:.2} m3/s, {:.0} Pa; {now} at ignition",
            fan.name,
            fan.free_flow,
            fan.dead_end_pressure
        );
    }
}
