mod common;
use common::*;
use doorglow::record::{Quantity as Q, Subject as S};
#[test]
fn scratch() {
    for (kw, open) in [(250.0, true), (100.0, true), (500.0, true), (100.0,false),(250.0,false),(500.0,false)] {
        let l = lining(0.0125, 0.073, 790.0, 1090.0);
        let mut p = plan(
            900.0,
            vec![room("burn room", 3.66, 3.66, 2.44, &l)],
            vec![door("door", 0, None, 0.9, 2.0, open), gap(0, 2.0, 0.05)],
            vec![methane()],
            vec![burner(0, kw * 1e3, 0.6, 0.5, false)],
        );
        if open { p.openings.truncate(1); }
        let t0 = std::time::Instant::now();
        let r = doorglow::solve::run(&p, 1.0, &mut |_| false).unwrap();
        println!("{kw} {open} {:?} {:?} {:?}", t0.elapsed(), r.work, r.ended);
        println!("{:?}", r.ledger);
        for q in [Q::UpperTemperature, Q::LowerTemperature, Q::MeanTemperature, Q::Interface, Q::GasMass, Q::UpperOxygenDry, Q::LowerOxygenDry, Q::Pressure, Q::CeilingTemperature, Q::UpperWallTemperature, Q::FloorFlux] {
            let v = r.get(S::Room(0), q);
            print!("{q:?}:");
            for t in [0usize, 10, 30, 60, 120, 200, 300, 450, 600, 900] { print!(" {:.3}", v.get(t).copied().unwrap_or(f64::NAN)); }
            println!();
        }
        for q in [Q::Burned, Q::FlamedShare, Q::BaseOxygen, Q::FreshAirAtBase] {
            let v = r.get(S::Item(0), q);
            print!("{q:?}:");
            for t in [0usize, 10, 30, 60, 120, 200, 300, 450, 600, 900] { print!(" {:.3}", v.get(t).copied().unwrap_or(f64::NAN)); }
            println!();
        }
        print!("in:"); for t in [60usize, 300, 600, 900] { print!(" {:.3}", r.get(S::Opening(0), Q::FlowBackward).get(t).copied().unwrap_or(f64::NAN)); } println!();
    }
}
