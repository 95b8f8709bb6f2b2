//! Radiation in a room of two layers: view factors close, an isothermal room
//! exchanges nothing, known limits come out.

use doorglow::physics::enclosure::{
    CEILING, Enclosure, FLOOR, Face, LOWER_WALL, UPPER_WALL, black, point_shares, shape,
};
use doorglow::physics::view_factor::parallel_rectangles;

fn rooms() -> Vec<[f64; 4]> {
    let mut rooms = Vec::new();
    for (w, l, h) in [(4.0, 3.0, 2.4), (12.0, 1.2, 2.5), (3.0, 3.0, 6.0)] {
        for share in [0.002, 0.05, 0.3, 0.5, 0.8, 0.998] {
            rooms.push([w, l, h, share * h]);
        }
    }
    rooms
}

#[test]
fn formula_four_surfaces_obey_summation_and_reciprocity() {
    for [w, l, h, z] in rooms() {
        let shape = shape(w, l, h, z, parallel_rectangles(w, l, h));
        for i in 0..4 {
            let sum: f64 = shape.view[i].iter().sum();
            assert!((sum - 1.0).abs() < 1e-12, "{w} {l} {h} {z} row {i}: {sum}");
            for j in 0..4 {
                let there = shape.area[i] * shape.view[i][j];
                let back = shape.area[j] * shape.view[j][i];
                assert!((there - back).abs() < 1e-12 * w * l, "{i} {j}");
                assert!(shape.view[i][j] > -1e-12, "{i} {j}: {}", shape.view[i][j]);
            }
        }
        let whole: f64 = shape.area.iter().sum();
        assert!((whole - 2.0 * (w * l + (w + l) * h)).abs() < 1e-9);
    }
}

#[test]
fn formula_cut_of_the_wall_does_not_change_what_the_floor_sees() {
    // Floor to ceiling stays; floor to both walls is the rest.
    let c = parallel_rectangles(4.0, 3.0, 2.4);
    for z in [0.3, 1.2, 2.1] {
        let shape = shape(4.0, 3.0, 2.4, z, c);
        let walls = shape.view[FLOOR][UPPER_WALL] + shape.view[FLOOR][LOWER_WALL];
        assert!((walls - (1.0 - c)).abs() < 1e-12);
        assert!((shape.view[FLOOR][CEILING] - c).abs() < 1e-15);
    }
}

#[test]
fn formula_isothermal_room_is_a_black_hollow_whatever_its_surfaces() {
    let emissivity = [0.9, 0.5, 0.2, 0.8];
    for t in [300.0, 900.0] {
        let faces = emissivity.map(|e| Face {
            emission: e * black(t),
            reflection: 1.0 - e,
        });
        for [w, l, h, z] in rooms() {
            let shape = shape(w, l, h, z, parallel_rectangles(w, l, h));
            for layer in [0.0, 0.4, 1.0] {
                let flux = Enclosure::new(&shape, &faces, layer, black(t)).irradiation();
                for i in 0..4 {
                    assert!((flux[i] / black(t) - 1.0).abs() < 1e-11, "{i}: {}", flux[i]);
                }
            }
        }
    }
}

#[test]
fn formula_black_layer_hides_the_ceiling_from_the_floor() {
    // Black cold surfaces under a black layer: the floor gets the share of the
    // plane of the interface.
    let cold = [Face::default(); 4];
    let shape = shape(4.0, 3.0, 2.4, 1.0, parallel_rectangles(4.0, 3.0, 2.4));
    let flux = Enclosure::new(&shape, &cold, 1.0, black(873.15)).irradiation();
    let plane = parallel_rectangles(4.0, 3.0, 1.0);
    assert!((flux[FLOOR] / (plane * black(873.15)) - 1.0).abs() < 1e-12);
    assert!((flux[CEILING] / black(873.15) - 1.0).abs() < 1e-12);
    // 500, 600 °C black layer at a view factor of 1: 20.3 and 33.0 kW/m2
    // without, 19.8 and 32.5 with what a floor at 20 °C sends back.
    assert!((black(773.15) - black(293.15) - 19.8e3).abs() < 100.0);
    assert!((black(873.15) - black(293.15) - 32.5e3).abs() < 100.0);
}

#[test]
fn conserve_radiation_between_reflecting_surfaces() {
    // What surfaces and layer send out, they and the layer take up.
    let t = [800.0, 600.0, 350.0, 320.0];
    let e = [0.9, 0.7, 0.5, 0.8];
    let faces: [Face; 4] = std::array::from_fn(|i| Face {
        emission: e[i] * black(t[i]),
        reflection: 1.0 - e[i],
    });
    let shape = shape(4.0, 3.0, 2.4, 1.1, parallel_rectangles(4.0, 3.0, 2.4));
    // Clear layer: net of all surfaces is zero.
    let flux = Enclosure::new(&shape, &faces, 0.0, black(700.0)).irradiation();
    let net: f64 = (0..4)
        .map(|i| shape.area[i] * (e[i] * flux[i] - faces[i].emission))
        .sum();
    assert!(net.abs() < 1e-6 * black(800.0), "{net}");
}

#[test]
fn formula_point_source_shares_close_and_pass_the_interface_smoothly() {
    for [w, l, h, z] in rooms() {
        for share in [0.0, 0.1, 0.5, 0.9, 1.0] {
            let shares = point_shares(w, l, h, z, share * h);
            let sum: f64 = shares.iter().sum();
            assert!((sum - 1.0).abs() < 1e-12);
            assert!(shares.iter().all(|s| *s >= 0.0));
        }
        let below = point_shares(w, l, h, z, z - 1e-7);
        let above = point_shares(w, l, h, z, z + 1e-7);
        for i in 0..4 {
            assert!((below[i] - above[i]).abs() < 1e-5);
        }
    }
    // The middle of a cube: a sixth for each of the six faces.
    let shares = point_shares(2.0, 2.0, 2.0, 1.0, 1.0);
    for (value, expected) in shares.iter().zip([1.0, 2.0, 2.0, 1.0]) {
        assert!((value - expected / 6.0).abs() < 1e-6);
    }
}
