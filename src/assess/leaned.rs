//! What the contact with guides comes to at a state.

use crate::column::{Column, ColumnState, Contact, Peak, Station};
use crate::result::Leaning;
use crate::setup::Setup;

/// Contact with the guides, in the column's units.
pub(super) struct Leaned {
    /// Smallest room; `None` without a guide beside the column.
    pub room: Option<f64>,
    /// Where it is.
    pub tightest_place: Option<f64>,
    /// All forces added up.
    pub push: f64,
    /// The largest over any one pitch, with its place.
    pub on_one_coil: Peak,
    /// On guides that may not be touched.
    pub forbidden: f64,
    /// Separate places.
    pub places: u32,
    /// Length of the longest of them.
    pub longest: f64,
    /// Length of the longest over that at which a part lying flat buckles away by itself.
    pub flat: f64,
    /// On corners at the ends of guides.
    pub at_corners: f64,
    /// Friction on the column along x, added up.
    pub drag: f64,
}

impl Leaned {
    /// Of a column at `state`; `stations` are those of its profile.
    pub fn on(setup: &Setup, column: &Column, state: &ColumnState, stations: &[Station]) -> Self {
        let mut contacts = Vec::new();
        column.contacts(state, &mut contacts);
        let pitch = setup.spring.pitch() / column.scale.length;
        let room = column.tightest(state, stations, false);
        let spans = spans(&contacts, pitch);
        Leaned {
            room: room.map(|tight| tight.value),
            tightest_place: room.map(|tight| tight.place),
            push: total(contacts.iter().map(|c| c.push)),
            on_one_coil: on_one_coil(&contacts, pitch),
            forbidden: total(contacts.iter().filter(|c| !c.may_touch).map(|c| c.push)),
            places: spans.len() as u32,
            longest: spans
                .iter()
                .fold(0.0, |longest, span| longest.max(span.1 - span.0)),
            flat: column.wave_number(-state.inner[0][3])
                * spans
                    .iter()
                    .fold(0.0, |longest: f64, span| longest.max(span.1 - span.0))
                / (2.0 * std::f64::consts::PI),
            at_corners: total(contacts.iter().filter(|c| c.at_corner).map(|c| c.push)),
            drag: total(contacts.iter().map(|c| c.drag)),
        }
    }
}

/// The sum; of nothing it is nought, not minus nought.
fn total(values: impl Iterator<Item = f64>) -> f64 {
    values.fold(0.0, |sum, value| sum + value)
}

/// Where a column leans at `state`, for people.
pub(super) fn stretches(column: &Column, state: &ColumnState) -> Vec<Leaning> {
    let mut contacts = Vec::new();
    column.contacts(state, &mut contacts);
    let scale = column.scale;
    contacts
        .iter()
        .map(|contact| Leaning {
            from_m: (contact.place - 0.5 * contact.width) * scale.length,
            to_m: (contact.place + 0.5 * contact.width) * scale.length,
            side: contact.side,
            force_n_per_m: contact.push / contact.width * scale.stiffness(),
            at_corner: contact.at_corner,
        })
        .collect()
}

/// Places that lean, from where to where along the axis: stretches on the same side less than a
/// pitch apart are one, as the coils between bear them together.
fn spans(contacts: &[Contact], pitch: f64) -> Vec<(f64, f64)> {
    let mut spans: Vec<(f64, f64, f64)> = Vec::new();
    for contact in contacts {
        let (from, to) = (
            contact.place - 0.5 * contact.width,
            contact.place + 0.5 * contact.width,
        );
        match spans.last_mut() {
            Some((_, end, side)) if *side == contact.side && from - *end < pitch => {
                *end = to;
            }
            _ => spans.push((from, to, contact.side)),
        }
    }
    spans.iter().map(|(from, to, _)| (*from, *to)).collect()
}

/// The largest force over any stretch of one pitch, on one side. As the force is even over each pad,
/// the largest is over a stretch that begins or ends with one.
fn on_one_coil(contacts: &[Contact], pitch: f64) -> Peak {
    let mut peak = Peak {
        place: 0.0,
        value: 0.0,
    };
    for bound in contacts {
        let (start, end) = (
            bound.place - 0.5 * bound.width,
            bound.place + 0.5 * bound.width,
        );
        for (from, to) in [(start, start + pitch), (end - pitch, end)] {
            let (mut force, mut moment) = (0.0, 0.0);
            for contact in contacts.iter().filter(|c| c.side == bound.side) {
                let begins = contact.place - 0.5 * contact.width;
                let inside = to.min(begins + contact.width) - from.max(begins);
                let share = (inside / contact.width).clamp(0.0, 1.0);
                force += share * contact.push;
                moment += share * contact.push * contact.place;
            }
            if force > peak.value {
                peak = Peak {
                    place: moment / force,
                    value: force,
                };
            }
        }
    }
    peak
}

#[cfg(test)]
mod tests {
    use super::*;

    fn pad(place: f64, push: f64, side: f64) -> Contact {
        Contact {
            place,
            width: 0.01,
            side,
            push,
            drag: 0.0,
            at_corner: false,
            may_touch: true,
        }
    }

    #[test]
    fn stretches_are_told_apart_by_gaps_and_sides() {
        let contacts = [
            pad(0.105, 1.0, 1.0),
            pad(0.115, 1.0, 1.0),
            pad(0.125, 1.0, -1.0),
            pad(0.5, 2.0, 1.0),
        ];
        assert_eq!(spans(&contacts, 0.1).len(), 3);
        approx::assert_abs_diff_eq!(spans(&contacts, 0.1)[0].1, 0.12, epsilon = 1e-12);
        let apart = [pad(0.105, 1.0, 1.0), pad(0.145, 1.0, 1.0)];
        assert_eq!(spans(&apart, 0.05).len(), 1);
        assert_eq!(spans(&apart, 0.02).len(), 2);
    }

    #[test]
    fn the_worst_coil_is_the_heaviest_pitch() {
        let contacts: Vec<Contact> = (0..10)
            .map(|i| pad(0.005 + 0.01 * f64::from(i), f64::from(i), 1.0))
            .collect();
        let peak = on_one_coil(&contacts, 0.025);
        // A stretch of two pads and a half that ends with the heaviest.
        approx::assert_abs_diff_eq!(peak.value, 9.0 + 8.0 + 3.5, epsilon = 1e-9);
    }
}
