//! Readings of an invented run whose moments can be worked out by hand, and of
//! broken records.

#![allow(clippy::unwrap_used)]

mod support;

use doorglow::exposure::observe;
use doorglow::plan::{Effect, OpeningId};
use doorglow::reading::{Answer, BackBy, Comeback, Kind, Moment, moments, summary};
use doorglow::record::{Dimension, Ended, Quantity, Record, Subject};
use doorglow::show::text::{Style, report};
use doorglow::show::{RunReading, timeline_csv};
use proptest::prelude::*;

fn read() -> Vec<Moment> {
    let (plan, mut record) = support::starved_and_back();
    observe(&mut record, &plan);
    moments(&record, &plan)
}

fn of(moments: &[Moment], kind: Kind) -> Vec<&Moment> {
    moments
        .iter()
        .filter(|moment| moment.kind == kind)
        .collect()
}

fn number(moment: &Moment, label: &str) -> f64 {
    let found = moment.numbers.iter().find(|number| number.label == label);
    found
        .unwrap_or_else(|| panic!("{label} in {moment:?}"))
        .value
}

#[test]
fn verify_times_are_in_order_and_count_from_the_last_action() {
    let read = read();
    assert!(read.windows(2).all(|pair| pair[0].time <= pair[1].time));
    for moment in &read {
        match &moment.since_action {
            Some(since) => {
                assert_eq!(since.action, "entry");
                assert!((moment.time - since.seconds - 480.0).abs() < 1e-9);
            }
            None => assert!(moment.time < 480.0),
        }
    }
}

#[test]
fn verify_shortage_of_air_has_its_hand_computed_start_and_end() {
    let read = read();
    let short = of(&read, Kind::ShortOfAir);
    // From 210 s: burned 0.7 MW - 8.286 kW/s, half of the free rate
    // 0.6945 MW + 0.113 kW/s.
    let start = 210.0
        + (0.7e6 - 0.5 * (1.38e6 + 40.0 * 70e3 / 310.0)) / (0.58e6 / 70.0 + 0.5 * 70e3 / 310.0);
    assert_eq!(short.len(), 1);
    assert!((short[0].time - start).abs() < 1e-3, "{}", short[0].time);
    let until = number(short[0], "until");
    // From 480 s: the air could burn 0.1 MW + 250 kW/s, the free rate is
    // 1.45 MW + 7.66 kW/s. Straight lines of a ratio are not those of its parts.
    let growth = 0.95e6 / 124.0;
    let end = 480.0 + 1.35e6 / (2.5e6 / 10.0 - growth);
    assert!((until - end).abs() < 0.05, "{until} {end}");
    // From 570 s: burned 1 MW + 41.18 kW/s, half of the free rate 1.0698 MW + 3.83 kW/s.
    let back = number(short[0], "at half of the free rate again");
    let half = 570.0 + (0.5 * (1.45e6 + 90.0 * growth) - 1.0e6) / (1.4e6 / 34.0 - 0.5 * growth);
    assert!((back - half).abs() < 1e-2, "{back}");
}

#[test]
fn verify_the_return_is_three_times_the_starved_level() {
    let read = read();
    let back = of(&read, Kind::BackUp);
    assert_eq!(back.len(), 1);
    let level = number(back[0], "starved level");
    // The mean of the last minute is 63.9 kW; it is still going down.
    assert!((level - 54e3).abs() < 1.0, "value at the opening: {level}");
    let expected = 500.0 + (3.0 * level - 60e3) / (0.94e6 / 70.0);
    assert!((back[0].time - expected).abs() < 0.1);
    let band = back[0].band.unwrap();
    assert!((band.earliest - (480.0 + 0.4 * (expected - 480.0))).abs() < 0.1);
    assert!((band.latest - (480.0 + 2.3 * (expected - 480.0))).abs() < 0.1);
}

#[test]
fn verify_nothing_before_the_opening_has_a_band() {
    assert!(
        read()
            .iter()
            .filter(|m| m.time <= 480.0)
            .all(|m| m.band.is_none())
    );
}

#[test]
fn verify_cold_air_comes_at_the_earliest_before_it_is_felt() {
    let read = read();
    let earliest = of(&read, Kind::AirEarliest);
    let felt = of(&read, Kind::AirFelt);
    assert_eq!((earliest.len(), felt.len()), (1, 1));
    // Hall 6 m at 93 °C, half of 4 m at 95 °C, outside 10 °C, height 2.4 m.
    let speed = |celsius: f64| 0.35 * (((celsius + 273.15) / 283.15 - 1.0) * 9.81 * 2.4).sqrt();
    let expected = 480.0 + 6.0 / speed(93.0) + 2.0 / speed(95.0);
    assert!((earliest[0].time - expected).abs() < 1e-6);
    assert!((felt[0].time - (488.0 + 32.0 * 0.01 / 0.041)).abs() < 0.1);
    assert!(earliest[0].time < felt[0].time);
}

#[test]
fn verify_flashover_is_near_before_and_yes_after_the_opening() {
    let (plan, mut record) = support::starved_and_back();
    observe(&mut record, &plan);
    let summary = summary(&record, &plan);
    let before = summary.rooms[0].flashover_before.unwrap();
    let after = summary.rooms[0].flashover_after.unwrap();
    assert_eq!(
        (before.word, before.by_layer, before.by_floor_flux),
        (Answer::Near, Answer::Near, Answer::Yes)
    );
    assert_eq!(after.word, Answer::Yes);
    assert_eq!(summary.rooms[1].flashover_after.unwrap().word, Answer::No);
    let read = moments(&record, &plan);
    assert_eq!(of(&read, Kind::Flashover).len(), 1);
    assert!(of(&read, Kind::Flashover)[0].time >= 590.0);
}

#[test]
fn verify_summary_has_peaks_on_both_sides_of_the_opening() {
    let (plan, record) = support::starved_and_back();
    let summary = summary(&record, &plan);
    assert_eq!(summary.first_opening.unwrap().action, "entry");
    assert_eq!(summary.peak_before.unwrap().time, 170.0);
    assert_eq!(summary.peak_after.unwrap().time, 604.0);
    assert_eq!(summary.lowest_before.unwrap().value, 54e3);
    assert_eq!(summary.short_of_air.len(), 1);
}

#[test]
fn verify_a_fire_that_stays_starved_does_not_come_back() {
    let (plan, record) = held_below(54e3, 500.0);
    let summary = summary(&record, &plan);
    assert_eq!(summary.comeback, Some(Comeback::NotInTheModel));
    assert!(of(&moments(&record, &plan), Kind::BackUp).is_empty());
}

/// The invented run with its heat release (W) and its layers (°C) held below
/// something after the opening.
fn held_below(release: f64, celsius: f64) -> (doorglow::plan::Plan, Record) {
    let (plan, mut record) = support::starved_and_back();
    for column in &mut record.columns {
        let most = match column.quantity {
            Quantity::Burned => release,
            Quantity::UpperTemperature => celsius + 273.0,
            _ => continue,
        };
        for (value, time) in column.values.iter_mut().zip(&record.time) {
            *value = value.min(if *time > 480.0 { most } else { f64::INFINITY });
        }
    }
    (plan, record)
}

#[test]
fn verify_growth_below_three_times_the_level_is_told_with_its_numbers() {
    let (mut plan, record) = held_below(150e3, 400.0);
    let mut shut = plan.actions[0].clone();
    shut.name = "shut again".into();
    shut.time = 600.0;
    shut.effect = Effect::ClearWidth {
        opening: OpeningId(1),
        width: 0.0,
    };
    plan.actions.push(shut);
    let read = summary(&record, &plan);
    let Some(Comeback::Grew {
        from,
        to,
        level,
        narrowed,
    }) = read.comeback.clone()
    else {
        panic!("{:?}", read.comeback);
    };
    assert!((from - 54e3).abs() < 1.0 && (level - 54e3).abs() < 1.0);
    assert_eq!(to.value, 150e3);
    let narrowed = narrowed.unwrap();
    assert_eq!((narrowed.shut, narrowed.time), (true, 600.0));
    let style = Style {
        colour: false,
        width: 200,
        details: false,
    };
    let text = report(&record, &plan, &moments(&record, &plan), &read, &style);
    for words in [
        "grew from 54 kW to 150 kW at",
        "below three times its starved level of 54 kW; front door shut at 10:00",
        "CO is reckoned with the yield of a fire with plenty of air",
    ] {
        assert!(text.contains(words), "{words}\n{text}");
    }
    assert!(!text.contains("does not come back"));
}

#[test]
fn verify_a_room_near_flashover_again_counts_as_back() {
    let (plan, record) = held_below(150e3, 600.0);
    let Some(Comeback::At { time, by, .. }) = summary(&record, &plan).comeback else {
        panic!("not back");
    };
    assert_eq!(by, BackBy::NearFlashover);
    assert!((time - 581.7).abs() < 0.1, "{time}");
}

/// Bands end where something else is done; a peak stands in the timeline also
/// where an action cuts its rise.
#[test]
fn verify_a_second_action_cuts_bands_and_keeps_the_peak() {
    let (mut plan, record) = support::starved_and_back();
    let mut held = plan.actions[0].clone();
    held.name = "hold".into();
    held.time = 590.0;
    held.effect = Effect::ClearWidth {
        opening: OpeningId(1),
        width: 0.13,
    };
    plan.actions.push(held);
    let read = moments(&record, &plan);
    for moment in &read {
        if let Some(band) = moment.band {
            let (from, to) = if moment.time < 590.0 {
                (480.0, 590.0)
            } else {
                (590.0, 900.0)
            };
            assert!(band.earliest >= from && band.latest <= to, "{moment:?}");
        }
    }
    let peaks: Vec<f64> = of(&read, Kind::Peak).iter().map(|m| m.time).collect();
    assert_eq!(peaks, [170.0, 604.0]);
}

#[test]
fn verify_air_that_comes_after_burning_out_is_no_moment() {
    let (mut plan, record) = support::starved_and_back();
    let mut late = plan.actions[0].clone();
    late.name = "late".into();
    late.time = 870.0;
    late.effect = Effect::ClearWidth {
        opening: OpeningId(1),
        width: 0.95,
    };
    plan.actions.push(late);
    let read = moments(&record, &plan);
    assert_eq!(of(&read, Kind::AirEarliest).len(), 1);
    assert_eq!(of(&read, Kind::Action).len(), 2);
}

#[test]
fn verify_every_kind_has_its_own_stable_name() {
    let mut names: Vec<&str> = Kind::ALL.iter().map(|kind| kind.name()).collect();
    for (kind, name) in Kind::ALL.iter().zip(&names) {
        let written = serde_json::to_string(kind).unwrap();
        assert_eq!(
            written.trim_matches('"').replace('_', ""),
            name.replace("_temperature", "").replace('_', "")
        );
    }
    names.sort_unstable();
    names.dedup();
    assert_eq!(names.len(), Kind::ALL.len());
}

#[test]
fn verify_a_pulsing_fire_is_summed_up() {
    let (plan, mut record) = support::starved_and_back();
    for column in &mut record.columns {
        if column.subject == Subject::House && column.quantity == Quantity::Burned {
            for (value, time) in column.values.iter_mut().zip(&record.time) {
                if (200.0..480.0).contains(time) {
                    *value = if (time / 35.0).floor() % 2.0 == 0.0 {
                        0.1e6
                    } else {
                        1.2e6
                    };
                }
            }
        }
    }
    let read = moments(&record, &plan);
    let before: Vec<_> = of(&read, Kind::ShortOfAir)
        .into_iter()
        .filter(|m| m.time < 480.0)
        .collect();
    assert_eq!(before.len(), 1);
    // Four pulses, and the last one begins just before the opening.
    assert!(
        before[0].text.contains("back and forth 5 times"),
        "{}",
        before[0].text
    );
}

#[test]
fn verify_a_run_that_broke_off_says_so() {
    let (plan, mut record) = support::starved_and_back();
    record.time.truncate(301);
    for column in &mut record.columns {
        column.values.truncate(301);
    }
    record.ended = Ended::Interrupted(300.0);
    let read = moments(&record, &plan);
    assert_eq!(read.last().unwrap().kind, Kind::Stopped);
    assert!(of(&read, Kind::Action).is_empty());
    let summary = summary(&record, &plan);
    let style = Style {
        colour: false,
        width: 80,
        details: false,
    };
    assert!(
        report(&record, &plan, &read, &summary, &style).contains("stopped by the user at 5:00")
    );
}

/// Everything that is made of a record.
fn read_all(record: &mut Record, plan: &doorglow::plan::Plan, width: usize) {
    observe(record, plan);
    let moments = moments(record, plan);
    let summary = summary(record, plan);
    for (colour, details) in [(true, true), (false, false)] {
        let text = report(
            record,
            plan,
            &moments,
            &summary,
            &Style {
                colour,
                width,
                details,
            },
        );
        assert!(colour || !text.contains('\u{1b}'));
    }
    timeline_csv(&moments).unwrap();
    serde_json::to_string(&RunReading::new(record, plan, &moments, &summary)).unwrap();
}

#[test]
fn verify_records_with_little_in_them_are_read() {
    let (plan, record) = support::starved_and_back();
    let mut empty = record.clone();
    empty.time.clear();
    empty.columns.clear();
    read_all(&mut empty, &plan, 80);
    let mut single = record.clone();
    single.time.truncate(1);
    for column in &mut single.columns {
        column.values.truncate(1);
    }
    read_all(&mut single, &plan, 0);
    let mut bare = plan.clone();
    bare.items.clear();
    bare.stations.clear();
    read_all(&mut record.clone(), &bare, 80);
    bare.rooms.clear();
    bare.openings.clear();
    read_all(&mut record.clone(), &bare, 80);
    let mut orphan = plan.clone();
    orphan.rooms.truncate(1);
    orphan.openings.truncate(1);
    read_all(&mut record.clone(), &orphan, 80);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    #[test]
    fn verify_no_record_makes_the_reading_panic(
        holes in prop::collection::vec((0..40_usize, 0..901_usize, 0..901_usize, 0..5_usize), 0..12),
        cut in 0..901_usize, width in 0..200_usize,
    ) {
        let (plan, mut record) = support::starved_and_back();
        for (column, from, to, what) in holes {
            let count = record.columns.len();
            let column = &mut record.columns[column % count];
            let odd = [f64::NAN, f64::INFINITY, f64::NEG_INFINITY, -1e30, 0.0][what];
            for value in column.values.iter_mut().skip(from).take(to.saturating_sub(from)) {
                *value = odd;
            }
        }
        record.time.truncate(cut);
        read_all(&mut record, &plan, width);
    }
}

#[test]
fn verify_csv_has_a_row_for_every_moment() {
    let read = read();
    let bytes = timeline_csv(&read).unwrap();
    let mut reader = csv::Reader::from_reader(bytes.as_slice());
    assert_eq!(reader.records().count(), read.len());
}

#[test]
fn verify_numbers_are_si() {
    let read = read();
    let action = of(&read, Kind::Action)[0];
    assert_eq!(number(action, "clear width"), 0.9);
    assert!((number(action, "heat release") - 54e3).abs() < 1e-6);
    let out = of(&read, Kind::Out);
    assert!(
        out.iter()
            .all(|m| m.numbers[0].dimension == Dimension::Temperature)
    );
    assert!(!out.is_empty());
}
