//! Permanent contract of the one door to the integrator
//! (`doorglow::solve::integrator`): what was found in the crate behind it must
//! not come through. Order and interpolant are checked on a problem that
//! depends on time, where a wrong node of the method shows.
// Tables for `--nocapture`; helpers outside the test functions may unwrap.
#![allow(clippy::print_stdout, clippy::unwrap_used)]

use doorglow::solve::integrator::{Equations, Outcome, Solution, Stretch, integrate};

/// A system given by a function, with hooks.
struct Given<F> {
    rates: F,
    stop_at: f64,
    refused: u32,
    times: Vec<f64>,
}

impl<F: FnMut(f64, &[f64], &mut [f64]) -> bool> Equations for Given<F> {
    fn rates(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> bool {
        let taken = (self.rates)(time, y, dy);
        self.refused += u32::from(!taken);
        taken
    }

    fn accepted(&mut self, time: f64, _y: &[f64]) -> bool {
        self.times.push(time);
        time >= self.stop_at
    }
}

fn given<F: FnMut(f64, &[f64], &mut [f64]) -> bool>(rates: F) -> Given<F> {
    Given {
        rates,
        stop_at: f64::INFINITY,
        refused: 0,
        times: Vec::new(),
    }
}

fn stretch(start: f64, end: f64, tolerance: f64) -> Stretch {
    Stretch {
        start,
        end,
        first_step: 1e-3,
        longest_step: f64::INFINITY,
        relative: tolerance,
        absolute: tolerance,
    }
}

/// `y' = y cos t`, of which the solution is `exp(sin t)`: depends on time and
/// state.
fn wavy(time: f64, y: &[f64], dy: &mut [f64]) -> bool {
    dy[0] = y[0] * time.cos();
    true
}

fn exact(time: f64) -> f64 {
    time.sin().exp()
}

/// Solution of [`wavy`] with all steps of one length.
fn fixed(step: f64) -> Solution {
    let mut system = given(wavy);
    let how = Stretch {
        first_step: step,
        longest_step: step,
        // So loose that no step is refused, and the cap sets the length.
        relative: 1e3,
        absolute: 1e3,
        ..stretch(0.0, 8.0, 1.0)
    };
    let solution = integrate(&mut system, &[1.0], &how, &[1.0]);
    assert_eq!(solution.outcome, Outcome::Reached);
    let counted = (8.0 / step).round();
    assert!(
        (solution.steps as f64 - counted).abs() <= 1.0,
        "{} steps, {counted} expected",
        solution.steps
    );
    solution
}

fn slope(errors: &[f64], factor: f64) -> Vec<f64> {
    errors
        .windows(2)
        .map(|pair| (pair[0] / pair[1]).ln() / factor.ln())
        .collect()
}

#[test]
fn verify_integrator_is_of_order_five_on_a_problem_that_depends_on_time() {
    let errors: Vec<f64> = [0.5, 0.25, 0.125, 0.0625]
        .into_iter()
        .map(|step| (fixed(step).state[0] - exact(8.0)).abs())
        .collect();
    let orders = slope(&errors, 2.0);
    println!("errors {errors:?}, orders {orders:?}");
    assert!(orders.iter().all(|order| *order > 4.5), "{orders:?}");
    assert!(
        (4.6..=5.8).contains(orders.last().unwrap()),
        "order {orders:?}"
    );
}

#[test]
fn verify_integrator_error_follows_the_tolerance() {
    let errors: Vec<f64> = [1e-4, 1e-6, 1e-8, 1e-10]
        .into_iter()
        .map(|tolerance| {
            let mut system = given(wavy);
            let how = stretch(0.0, 8.0, tolerance);
            let solution = integrate(&mut system, &[1.0], &how, &[1.0]);
            assert_eq!(solution.outcome, Outcome::Reached);
            let error = (solution.state[0] - exact(8.0)).abs();
            println!("{tolerance:e}: error {error:.2e}, {} steps", solution.steps);
            assert!(error < 30.0 * tolerance, "{error:e} at {tolerance:e}");
            error
        })
        .collect();
    // Each hundredth of the tolerance gives a like share of the error.
    assert!(
        errors.windows(2).all(|pair| pair[1] < 0.1 * pair[0]),
        "{errors:?}"
    );
}

#[test]
fn verify_integrator_interpolant_is_of_order_four() {
    let worst = |step: f64| {
        let solution = fixed(step);
        (1..800)
            .map(|n| {
                let time = f64::from(n) * 0.01;
                (solution.at(time).unwrap()[0] - exact(time)).abs()
            })
            .fold(0.0, f64::max)
    };
    let errors: Vec<f64> = [0.4, 0.2, 0.1, 0.05].into_iter().map(worst).collect();
    let orders = slope(&errors, 2.0);
    println!("errors {errors:?}, orders {orders:?}");
    assert!(orders.iter().all(|order| *order > 3.7), "{orders:?}");
}

#[test]
fn verify_integrator_never_reads_beyond_its_last_point() {
    // One long step of cos t: an interpolant carried on would be far off.
    let mut system = given(|time: f64, _: &[f64], dy: &mut [f64]| {
        dy[0] = time.cos();
        true
    });
    let solution = integrate(&mut system, &[1.0], &stretch(0.0, 20.0, 1e-6), &[0.0]);
    assert_eq!(solution.time, 20.0);
    assert!((solution.at(20.0).unwrap()[0] - 20.0_f64.sin()).abs() < 1e-4);
    assert_eq!(solution.at(20.0), Some(solution.state.clone()));
    for beyond in [20.001, 21.0, 40.0, f64::INFINITY] {
        assert_eq!(solution.at(beyond), None, "read at {beyond}");
    }
    for before in [-1.0, -1e-3] {
        assert_eq!(solution.at(before), None, "read at {before}");
    }
    assert!(solution.at(f64::NAN).is_none());
}

#[test]
fn verify_integrator_gives_the_grid_exactly_and_the_ends_too() {
    let mut system = given(wavy);
    let solution = integrate(&mut system, &[1.0], &stretch(0.0, 8.0, 1e-9), &[1.0]);
    for n in 0..=80 {
        let time = f64::from(n) * 0.1;
        let found = solution.at(time).unwrap()[0];
        assert!(
            (found - exact(time)).abs() < 2e-7,
            "{found} at {time}, exact {}",
            exact(time)
        );
    }
    assert_eq!(solution.at(0.0).unwrap(), vec![1.0]);
}

#[test]
fn verify_integrator_works_in_scaled_variables() {
    // The same decay at 1e9 and at 1e-3 with one tolerance.
    let scale = [1e9, 1e-3];
    let mut system = given(|_, y: &[f64], dy: &mut [f64]| {
        dy[0] = -y[0];
        dy[1] = -2.0 * y[1];
        true
    });
    let how = stretch(0.0, 3.0, 1e-8);
    let solution = integrate(&mut system, &scale, &how, &[1e9, 1e-3]);
    assert!((solution.state[0] / 1e9 / (-3.0_f64).exp() - 1.0).abs() < 1e-6);
    assert!((solution.state[1] / 1e-3 / (-6.0_f64).exp() - 1.0).abs() < 1e-5);
}

#[test]
fn verify_integrator_starts_at_negative_times() {
    let mut system = given(wavy);
    let how = stretch(-3.0, 1.0, 1e-8);
    let solution = integrate(&mut system, &[1.0], &how, &[exact(-3.0)]);
    assert_eq!(solution.outcome, Outcome::Reached);
    assert!((solution.state[0] - exact(1.0)).abs() < 1e-6);
    for n in 0..=40 {
        let time = -3.0 + 0.1 * f64::from(n);
        assert!((solution.at(time).unwrap()[0] - exact(time)).abs() < 1e-6);
    }
    assert_eq!(solution.at(-3.1), None);
    assert_eq!(system.times.last(), Some(&1.0));
}

#[test]
fn verify_integrator_refuses_not_a_number_though_the_derivative_hides_it() {
    // The state turns to not-a-number past 1 s, and `max` makes the derivative
    // finite again: the crate behind would go on with it.
    let mut system = given(|time: f64, y: &[f64], dy: &mut [f64]| {
        dy[0] = if time > 1.0 { f64::NAN } else { 1.0 };
        dy[1] = y[0].max(0.0);
        true
    });
    let solution = integrate(
        &mut system,
        &[1.0, 1.0],
        &stretch(0.0, 5.0, 1e-6),
        &[0.0, 0.0],
    );
    assert!(
        matches!(solution.outcome, Outcome::Failed(_)),
        "{:?}",
        solution.outcome
    );
    assert!(solution.time <= 1.0 + 1e-6, "went on to {}", solution.time);
    assert!(solution.state.iter().all(|y| y.is_finite()));
    assert!(solution.at(0.5).unwrap().iter().all(|y| y.is_finite()));

    // Hidden wholly: the state itself is not-a-number from the start.
    let mut hidden = given(|_, y: &[f64], dy: &mut [f64]| {
        dy[0] = y[0].clamp(0.0, 1.0);
        dy[0] = if dy[0].is_nan() { 0.0 } else { dy[0] };
        true
    });
    let solution = integrate(&mut hidden, &[1.0], &stretch(0.0, 5.0, 1e-6), &[f64::NAN]);
    assert!(matches!(solution.outcome, Outcome::Failed(_)));
}

#[test]
fn verify_integrator_shrinks_the_step_at_a_refusal_and_recovers() {
    // Falling towards 0.5 it must never be evaluated below 0.499: long steps
    // are refused, shorter ones go through.
    let mut system = given(|_, y: &[f64], dy: &mut [f64]| {
        dy[0] = -20.0 * (y[0] - 0.5);
        y[0] >= 0.499
    });
    let how = Stretch {
        first_step: 2.0,
        ..stretch(0.0, 4.0, 1e-4)
    };
    let solution = integrate(&mut system, &[1.0], &how, &[2.0]);
    println!(
        "{} refused, {} rejected, {} steps",
        system.refused, solution.rejections, solution.steps
    );
    assert_eq!(solution.outcome, Outcome::Reached);
    assert!(system.refused > 0, "the check itself met no refusal");
    assert!(solution.rejections > 0);
    assert!((solution.state[0] - 0.5).abs() < 1e-3);
    let exact = |t: f64| 0.5 + 1.5 * (-20.0 * t).exp();
    assert!((solution.at(0.1).unwrap()[0] - exact(0.1)).abs() < 2e-3);
}

#[test]
fn verify_integrator_stops_where_every_step_is_refused_and_keeps_the_rest() {
    let mut system = given(|time: f64, _: &[f64], dy: &mut [f64]| {
        dy[0] = 1.0;
        time < 2.0
    });
    let solution = integrate(&mut system, &[1.0], &stretch(0.0, 5.0, 1e-6), &[0.0]);
    assert!(
        matches!(solution.outcome, Outcome::Failed(_)),
        "{:?}",
        solution.outcome
    );
    assert!(
        (1.9..=2.0).contains(&solution.time),
        "failed at {}",
        solution.time
    );
    // What was reached is kept, with its state, and can be read.
    assert!((solution.state[0] - solution.time).abs() < 1e-6);
    assert!((solution.at(1.5).unwrap()[0] - 1.5).abs() < 1e-6);
    assert_eq!(solution.at(3.0), None);
    assert!(solution.steps > 0);
}

#[test]
fn verify_integrator_fails_where_the_start_is_refused() {
    // Every slope alike would have no error to be rejected by.
    let mut system = given(|_, _: &[f64], dy: &mut [f64]| {
        dy[0] = 1.0;
        false
    });
    let solution = integrate(&mut system, &[1.0], &stretch(0.0, 5.0, 1e-6), &[2.0]);
    assert!(
        matches!(solution.outcome, Outcome::Failed(_)),
        "{:?} with {:?}",
        solution.outcome,
        solution.state
    );
    assert_eq!(solution.time, 0.0);
    assert_eq!(solution.state, vec![2.0]);
}

#[test]
fn verify_integrator_stops_when_told_to_and_keeps_the_rest() {
    let mut system = given(wavy);
    system.stop_at = 3.0;
    let how = Stretch {
        longest_step: 0.1,
        ..stretch(0.0, 8.0, 1e-8)
    };
    let solution = integrate(&mut system, &[1.0], &how, &[1.0]);
    assert_eq!(solution.outcome, Outcome::Stopped);
    assert!((3.0..3.11).contains(&solution.time), "{}", solution.time);
    assert!((solution.state[0] - exact(solution.time)).abs() < 1e-6);
    assert!((solution.at(2.0).unwrap()[0] - exact(2.0)).abs() < 1e-5);
    assert_eq!(system.times.last(), Some(&solution.time));
}

/// A source that switches on at 2.37 s.
fn switched(time: f64, _: &[f64], dy: &mut [f64]) -> bool {
    dy[0] = if time < 2.37 { 0.0 } else { 1.0 };
    true
}

#[test]
fn verify_integrator_landing_on_a_jump_makes_it_exact() {
    let wide = |start, end| Stretch {
        first_step: 0.5,
        ..stretch(start, end, 1e-4)
    };
    let mut ignored = given(switched);
    let without = integrate(&mut ignored, &[1.0], &wide(0.0, 6.0), &[0.0]);
    let mut landed = given(switched);
    let before = integrate(&mut landed, &[1.0], &wide(0.0, 2.37 - 1e-12), &[0.0]);
    let restart = Stretch {
        first_step: 0.02,
        ..wide(2.37, 6.0)
    };
    let after = integrate(&mut landed, &[1.0], &restart, &before.state);
    let error = |solution: &Solution| (solution.state[0] - 3.63).abs();
    println!(
        "ignored {:.1e} in {} steps, landed {:.1e} in {} steps",
        error(&without),
        without.steps,
        error(&after),
        before.steps + after.steps
    );
    assert!(error(&after) < 1e-9);
    assert!(error(&without) > 100.0 * error(&after));
}

#[test]
fn verify_integrator_a_capped_step_meets_a_short_pulse() {
    // A pulse of half a second at 100 s, in a problem at rest.
    let pulse = |time: f64, _: &[f64], dy: &mut [f64]| {
        dy[0] = if (100.0..100.5).contains(&time) {
            1.0
        } else {
            0.0
        };
        true
    };
    let run = |longest: f64| {
        let mut system = given(pulse);
        let how = Stretch {
            longest_step: longest,
            ..stretch(0.0, 600.0, 1e-4)
        };
        integrate(&mut system, &[1.0], &how, &[0.0]).state[0]
    };
    let (free, capped) = (run(f64::INFINITY), run(0.4));
    println!("pulse of 0.5: free step {free:.3}, capped {capped:.3}");
    assert!(free < 0.1, "the free step was expected to miss it: {free}");
    assert!((capped - 0.5).abs() < 0.05, "{capped}");
}

#[test]
fn verify_integrator_does_not_fail_on_stiff_stretches() {
    // Fast against the length of the run: many steps, but no verdict.
    let mut system = given(|time: f64, y: &[f64], dy: &mut [f64]| {
        dy[0] = -2000.0 * (y[0] - time.cos());
        true
    });
    let solution = integrate(&mut system, &[1.0], &stretch(0.0, 5.0, 1e-5), &[0.0]);
    assert_eq!(solution.outcome, Outcome::Reached);
    assert!(solution.steps > 1000, "{} steps", solution.steps);
    assert!((solution.state[0] - 5.0_f64.cos()).abs() < 1e-2);
}

#[test]
fn verify_integrator_counts_its_work() {
    let mut evaluations = 0_u64;
    let mut system = given(|time: f64, y: &[f64], dy: &mut [f64]| {
        evaluations += 1;
        wavy(time, y, dy)
    });
    let solution = integrate(&mut system, &[1.0], &stretch(0.0, 8.0, 1e-6), &[1.0]);
    assert!(solution.steps > 3);
    assert!(
        solution.evaluations.abs_diff(evaluations) <= 2,
        "{} counted, {evaluations} made",
        solution.evaluations
    );
}
