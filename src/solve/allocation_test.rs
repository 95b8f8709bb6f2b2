//! The derivative allocates nothing, whatever the plan.

#[allow(clippy::unwrap_used)]
#[path = "../../tests/common/mod.rs"]
mod common;

use super::building::Building;
use super::derivative::Model;
use crate::plan::Plan;

fn allocations_of_evaluations(plan: &Plan) -> u64 {
    let Ok(building) = Building::new(plan) else {
        return u64::MAX;
    };
    let mut model = Model::new(plan, &building);
    let state = building.initial_state(plan);
    let mut rates = vec![0.0; state.len()];
    let info = allocation_counter::measure(|| {
        for n in 0..10 {
            // A refused state counts as well.
            let _ = model.evaluate(f64::from(n) * 0.1 * plan.end, &state, &mut rates);
        }
    });
    info.count_total
}

#[test]
fn regress_an_evaluation_allocates_nothing() {
    assert_eq!(allocations_of_evaluations(&common::one_room_door()), 0);
    assert_eq!(allocations_of_evaluations(&common::larch_row()), 0);
    for seed in 0..50 {
        let plan = common::generated::plan(seed);
        assert_eq!(allocations_of_evaluations(&plan), 0, "seed {seed}");
    }
}
