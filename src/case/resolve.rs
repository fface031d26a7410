//! The filled form becomes the setup: everything decided, at service temperature.

use super::filled::{Filled, Log};
use super::material::{self, MaterialNotes};
use super::{duty, form, guide, imperfections, spring, support};
use crate::setup::{Imperfections, Setup, Support, hold};
use crate::spring::Spring;
use crate::units::Metre;

/// The setup that the file asks for; `None` where a mistake is noted.
pub(super) fn resolve(
    file: &Filled,
    file_name: &str,
    log: &mut Log,
) -> Option<(Setup, MaterialNotes)> {
    let title = if file.is_given(&form::TITLE) {
        file.word(&form::TITLE, log)
    } else {
        file.note_default(&form::TITLE, log);
        Some(file_name.chars().filter(|c| !c.is_control()).collect())
    };
    let cold = file
        .table(&form::SPRING)
        .and_then(|table| spring::cold(table, log));
    let moduli = file
        .table(&form::MATERIAL)
        .and_then(|table| material::moduli(table, log));
    let spring = match (&cold, &moduli) {
        (Some(cold), Some(moduli)) => Some(cold.at(moduli, log)),
        _ => None,
    };
    let factor = moduli.as_ref().map_or(1.0, |m| m.length_factor());
    let free_length = file
        .table(&form::SPRING)
        .and_then(|table| spring::free_length(table, log))
        .map(|length| length * factor);
    let (bottom, top) = supports(file, free_length, spring.as_ref(), log);
    let guides = guide::guides(file, spring.as_ref(), [bottom.as_ref(), top.as_ref()], log);
    let imperfections = imperfections(file, factor, spring.as_ref(), log);
    let duty = file
        .table(&form::DUTY)
        .and_then(|table| duty::duty(table, spring.as_ref(), [bottom.as_ref(), top.as_ref()], log));
    let moduli = moduli?;
    let mut setup = Setup {
        title: title?,
        material: moduli.name,
        temperature: moduli.temperature,
        spring: spring?,
        bottom: bottom?,
        top: top?,
        guides: guides?,
        imperfections: imperfections?,
        duty: duty?,
        defaulted: Vec::new(),
        warnings: Vec::new(),
    };
    if setup.guides.iter().any(guide::rubs_on_top) {
        setup = setup.turned_over();
        log.warnings.push(
            "a guide that the top seat carries has friction: the case is computed turned over, so \
             that in all that follows bottom and top have changed places, and the sides with them"
                .to_owned(),
        );
    }
    setup.defaulted = std::mem::take(&mut log.defaulted);
    setup.warnings = std::mem::take(&mut log.warnings);
    Some((setup, moduli.notes))
}

/// Both supports, held against the spring's free length and one another.
fn supports(
    file: &Filled,
    free_length: Option<Metre>,
    spring: Option<&Spring>,
    log: &mut Log,
) -> (Option<Support>, Option<Support>) {
    let mut read = |field| {
        let table = file.table(field)?;
        let support = support::support(table, spring, log)?;
        let sound = free_length
            .is_none_or(|free_length| support::check_arm(table, &support, free_length, log));
        Some((table, support, sound))
    };
    let (mut bottom, mut top) = (read(&form::BOTTOM), read(&form::TOP));
    let lined_up = match (&mut bottom, &mut top) {
        (Some((bottom_table, bottom, _)), Some((top_table, top, _))) => {
            support::line_up((bottom_table, bottom), (top_table, top), log)
        }
        _ => false,
    };
    if let (Some((_, bottom, _)), Some((table, top, _)), Some(spring)) = (&bottom, &top, spring) {
        support::check_reach(table, top, bottom, spring, log);
    }
    // An arm that is too long is the cause of what it makes impossible.
    let sound = lined_up
        && [&bottom, &top]
            .iter()
            .all(|read| read.as_ref().is_some_and(|(_, _, sound)| *sound));
    if sound
        && let (Some((bottom_table, bottom, _)), Some((top_table, top, _))) = (&bottom, &top)
        && !hold(bottom, top, free_length.unwrap_or(f64::INFINITY))
    {
        log.mistakes
            .push(support::not_held(bottom_table, top_table));
    }
    (bottom.map(|(_, s, _)| s), top.map(|(_, s, _)| s))
}

fn imperfections(
    file: &Filled,
    length_factor: f64,
    spring: Option<&Spring>,
    log: &mut Log,
) -> Option<Imperfections> {
    if !file.is_given(&form::IMPERFECTIONS) {
        return spring.map(|spring| imperfections::assumed(spring, log));
    }
    let table = file.table(&form::IMPERFECTIONS)?;
    let given = imperfections::imperfections(table, length_factor, log)?;
    if let Some(spring) = spring {
        imperfections::check(table, &given, spring, log);
    }
    Some(given)
}
