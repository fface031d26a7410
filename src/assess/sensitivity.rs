//! Which property of the supports the critical deflection hangs on: each that can be known badly is
//! changed by 10 % either way, one at a time.

use super::MESHES;
use super::straight::floor;
use crate::column::{Column, Idealisation, StraightScan};
use crate::result::{Sensitivities, SupportSensitivity};
use crate::setup::{Link, Restraint, Setup, Support};
use crate::units::Metre;

/// Share by which a property is changed.
const CHANGE: f64 = 0.1;
/// A relative change of the critical deflection that nobody needs to measure for.
const SMALL: f64 = 1e-3;

/// A property of a support.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Property {
    Rotation,
    Sideways,
    Axial,
    Arm,
    LinkLength,
}

impl Property {
    const ALL: [Property; 5] = [
        Property::Rotation,
        Property::Sideways,
        Property::Axial,
        Property::Arm,
        Property::LinkLength,
    ];

    fn key(self) -> &'static str {
        match self {
            Property::Rotation => "rotational_stiffness",
            Property::Sideways => "sideways_stiffness",
            Property::Axial => "axial_stiffness",
            Property::Arm => "arm",
            Property::LinkLength => "link_length",
        }
    }

    /// Whether this support has it in a size that can change. An arm does nothing where the end
    /// cannot turn.
    fn is_of(self, support: &Support) -> bool {
        match self {
            Property::Rotation => support.rotation.gives(),
            Property::Sideways => support.sideways.gives(),
            Property::Axial => support.axial.gives(),
            Property::Arm => support.arm != 0.0 && support.rotation != Restraint::Held,
            Property::LinkLength => support.link.is_some(),
        }
    }

    /// The support with this property times `factor`.
    fn changed(self, support: &Support, factor: f64) -> Support {
        let mut changed = *support;
        match self {
            Property::Rotation => changed.rotation = support.rotation.stiffened(factor),
            Property::Sideways => changed.sideways = support.sideways.stiffened(factor),
            Property::Axial => changed.axial = support.axial.stiffened(factor),
            Property::Arm => changed.arm = support.arm * factor,
            Property::LinkLength => {
                changed.link = support.link.map(|link| Link {
                    length: link.length * factor,
                    ..link
                });
            }
        }
        changed
    }
}

/// An end of the spring.
#[derive(Clone, Copy, Debug)]
enum End {
    Bottom,
    Top,
}

impl End {
    fn of(self, setup: &mut Setup) -> &mut Support {
        match self {
            End::Bottom => &mut setup.bottom,
            End::Top => &mut setup.top,
        }
    }

    fn word(self) -> &'static str {
        match self {
            End::Bottom => "bottom",
            End::Top => "top",
        }
    }
}

/// The sensitivities of this case, by falling effect; `None` where no property of its supports can
/// change.
pub(super) fn of_supports(setup: &Setup) -> Option<Sensitivities> {
    let mut changed = setup.clone();
    let mut now = None;
    let mut properties = Vec::new();
    for end in [End::Bottom, End::Top] {
        let as_given = *end.of(&mut changed);
        for property in Property::ALL {
            if !property.is_of(&as_given) {
                continue;
            }
            let now = *now.get_or_insert_with(|| critical(setup));
            let [larger, smaller] = [1.0 + CHANGE, 1.0 - CHANGE].map(|factor| {
                *end.of(&mut changed) = property.changed(&as_given, factor);
                critical(&changed)
            });
            *end.of(&mut changed) = as_given;
            properties.push(compared(setup, end.word(), property, now, larger, smaller));
        }
    }
    properties.sort_by(|a, b| effect(b).total_cmp(&effect(a)));
    let sentence = sentence(properties.first()?);
    Some(Sensitivities {
        properties,
        sentence,
    })
}

/// Critical travel of the perfect column as built, m, on the coarser and the finer mesh.
fn critical(setup: &Setup) -> [Option<Metre>; 2] {
    MESHES.map(|elements| {
        let mut column = Column::of_setup(setup, Idealisation::AsBuilt, elements, None);
        let scale = column.scale;
        let found = StraightScan::new(&mut column).buckling()?;
        let force = found.load * scale.force;
        Some(found.shortening * scale.length + setup.seats_give(force).0)
    })
}

fn compared(
    setup: &Setup,
    end: &str,
    property: Property,
    now: [Option<Metre>; 2],
    larger: [Option<Metre>; 2],
    smaller: [Option<Metre>; 2],
) -> SupportSensitivity {
    let change = |then: [Option<Metre>; 2]| [0, 1].map(|mesh| Some(then[mesh]? / now[mesh]? - 1.0));
    let (up, down) = (change(larger), change(smaller));
    let difference = |[coarse, fine]: [Option<f64>; 2]| Some((coarse? - fine?).abs());
    let error = [up, down]
        .into_iter()
        .filter_map(difference)
        .reduce(f64::max)
        .zip(now[1])
        .map(|(error, now)| error + 2.0 * floor(setup, now) / now);
    SupportSensitivity {
        end: end.to_owned(),
        property: property.key().to_owned(),
        critical_if_larger_m: larger[1],
        critical_if_smaller_m: smaller[1],
        relative_change_if_larger: up[1],
        relative_change_if_smaller: down[1],
        relative_change_error: error,
    }
}

/// What a list is sorted by. To turn "never" into a critical deflection, or back, is most.
fn effect(property: &SupportSensitivity) -> f64 {
    let (larger, smaller) = (
        property.relative_change_if_larger,
        property.relative_change_if_smaller,
    );
    match (larger, smaller) {
        (Some(larger), Some(smaller)) => larger.abs().max(smaller.abs()),
        _ if property.critical_if_larger_m.is_none()
            && property.critical_if_smaller_m.is_none() =>
        {
            0.0
        }
        _ => f64::INFINITY,
    }
}

fn sentence(first: &SupportSensitivity) -> String {
    let what = format!(
        "the {} of the {} support",
        first.property.replace('_', " "),
        first.end
    );
    let effect = effect(first);
    if effect.is_infinite() {
        format!(
            "Measure {what} first: 10 % of it decide whether the perfect column has a critical \
             deflection at all."
        )
    } else if effect < SMALL {
        format!(
            "None needs to be known better for the critical deflection: {what} does most, and 10 % \
             of it move it by {:.2} %.",
            100.0 * effect
        )
    } else {
        format!(
            "Measure {what} first: 10 % of it move the critical deflection by up to {:.2} %.",
            100.0 * effect
        )
    }
}
