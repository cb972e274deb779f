//! Front is front: the signs that a wrong convention would turn round.

use arraywright::radio::{Response, Soil, WorstRear, delay_factor, directivity};
use num_complex::Complex64;

use crate::support::{crossfire, mhz, vertical, wire};

const STEP_M: f64 = 18.3;

fn pair() -> Response {
    let elements = [vertical(0.0, 0.0, 6.0), vertical(STEP_M, 0.0, 6.0)];
    Response::new(&elements, Soil::AVERAGE, mhz(1.83)).expect("a legal array")
}

#[test]
fn an_element_10_m_nearer_the_source_through_10_m_of_delay_is_in_phase_with_one_at_the_origin() {
    let frequency = mhz(1.83);
    let elements = [vertical(0.0, 0.0, 6.0), vertical(10.0, 0.0, 6.0)];
    let response = Response::new(&elements, Soil::Perfect, frequency).expect("a legal array");
    let fields = response.fields(0.0, 0.0);
    let ratio = fields[1].theta * delay_factor(frequency, 10.0) / fields[0].theta;
    assert!((ratio - 1.0).norm() < 1e-12, "{ratio}");
    let from_behind = response.fields(180.0, 0.0);
    assert!((from_behind[1].theta * delay_factor(frequency, 10.0) / from_behind[0].theta - 1.0).norm() > 0.5);
}

#[test]
fn an_element_to_the_right_leads_from_the_right() {
    let elements = [vertical(0.0, 0.0, 6.0), vertical(0.0, -10.0, 6.0)];
    assert!(elements[1].position.right_m > 0.0);
    let response = Response::new(&elements, Soil::Perfect, mhz(1.83)).expect("a legal array");
    let from_right = response.fields(90.0, 0.0);
    assert!((from_right[1].theta / from_right[0].theta).arg() > 0.0);
    let from_left = response.fields(270.0, 0.0);
    assert!((from_left[1].theta / from_left[0].theta).arg() < 0.0);
}

#[test]
fn crossfire_hears_forward_and_nulls_the_rear_horizon() {
    let response = pair();
    let weights = crossfire(mhz(1.83), STEP_M);
    let front = response.power(&weights, 0.0, 20.0);
    assert!(response.power(&weights, 180.0, 20.0) < 0.01 * front);
    // on the horizon itself over real ground nothing is heard at all; just above it the null holds
    assert!(response.power(&weights, 180.0, 1.0) < 1e-6 * response.power(&weights, 0.0, 1.0));
}

#[test]
fn the_inverter_with_the_delay_in_the_front_leg_nulls_forward() {
    let response = pair();
    let trap = [-Complex64::ONE, delay_factor(mhz(1.83), STEP_M)];
    let back = response.power(&trap, 180.0, 1.0);
    assert!(response.power(&trap, 0.0, 1.0) < 1e-6 * back);
}

#[test]
fn a_terminated_wire_hears_from_its_far_end() {
    let response =
        Response::new(&[wire(0.0, 0.0, 176.0, 3.0)], Soil::AVERAGE, mhz(1.83)).expect("a legal array");
    let weights = [Complex64::ONE];
    assert!(response.power(&weights, 0.0, 30.0) > 50.0 * response.power(&weights, 180.0, 30.0));
}

#[test]
fn a_beam_pulled_to_the_right_leaves_its_worst_rear_lobe_on_a_clockwise_azimuth() {
    let frequency = mhz(1.83);
    let elements = [vertical(0.0, 20.0, 6.0), vertical(0.0, -20.0, 6.0)];
    let response = Response::new(&elements, Soil::AVERAGE, frequency).expect("a legal array");
    // the right-hand element delayed: the beam turns clockwise
    let weights = [Complex64::ONE, delay_factor(frequency, 20.0)];
    assert!(response.power(&weights, 30.0, 20.0) > response.power(&weights, 330.0, 20.0));
    let WorstRear { azimuth_deg, .. } = directivity(&response, &weights).worst_rear;
    assert!((90.0..180.0).contains(&azimuth_deg), "{azimuth_deg}");
    let found = directivity(&response, &weights).worst_rear;
    let there = response.power(&weights, found.azimuth_deg, found.elevation_deg);
    let mirrored = response.power(&weights, 360.0 - found.azimuth_deg, found.elevation_deg);
    assert!(there > mirrored);
}
