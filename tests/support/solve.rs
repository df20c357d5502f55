//! Analyses that must succeed.

use swaybound::approx;
use swaybound::exact::{slope_deflection, stiffness};
use swaybound::frame::Frame;
use swaybound::response::{Fit, Response};

/// Exact answer without axial strain.
#[track_caller]
pub fn inextensible(frame: &Frame) -> Response {
    match slope_deflection::analyse(frame) {
        Ok(response) => response,
        Err(reason) => panic!("slope-deflection could not solve a sound frame: {reason}"),
    }
}

/// Exact answer with column axial strain.
#[track_caller]
pub fn strained(frame: &Frame) -> Response {
    match stiffness::analyse(frame) {
        Ok(response) => response,
        Err(reason) => panic!("stiffness could not solve a sound frame: {reason}"),
    }
}

/// Answer of the quick method called `id`.
#[track_caller]
pub fn quick(id: &str, frame: &Frame) -> Response {
    match approx::find(id) {
        Some(entry) => entry.analyse(frame),
        None => panic!("no quick method is called {id}"),
    }
}

/// Answers of every quick method that does not refuse the frame.
pub fn every_quick(frame: &Frame) -> Vec<Response> {
    let willing = approx::METHODS.iter().filter(|entry| !matches!((entry.fit)(frame), Fit::Refused(_)));
    willing.map(|entry| entry.analyse(frame)).collect()
}

/// Answers of every method there is, exact and quick, that does not refuse the frame; it must have areas.
#[track_caller]
pub fn every(frame: &Frame) -> Vec<Response> {
    let mut responses = every_quick(frame);
    responses.push(inextensible(frame));
    responses.push(strained(frame));
    responses
}

/// Those of the answers that state member forces.
pub fn with_forces(responses: Vec<Response>) -> impl Iterator<Item = Response> {
    responses.into_iter().filter(Response::has_forces)
}
