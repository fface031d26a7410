//! `[duty]`: what the spring must do, resolved to travel of the machine.

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range, Rule};
use super::filled::{Filled, Log};
use crate::setup::{Duty, LimitKind, Loading, Margins, Restraint, Support};
use crate::spring::Spring;
use crate::units::{Dimension, MILLIMETRE, Metre, Newton, NewtonPerMetre, significant};

const LENGTH: Kind = Kind::Quantity(Dimension::LENGTH, Range::Positive);
const TRAVEL: Kind = Kind::Quantity(Dimension::LENGTH, Range::NotNegative);
const MARGIN: Kind = Kind::Share(Range::NotNegative);

static LOADING: Field = Field::new(
    "loading",
    Kind::Choice(|| vec!["deflection", "force"]),
    "deflection",
    "What drives the spring: a machine that sets the deflection, or a dead weight that sets the force.",
)
.or(Absent::Value("deflection"));
static INSTALLED_DEFLECTION: Field = Field::new(
    "installed_deflection",
    TRAVEL,
    "40 mm",
    "Deflection as installed, as travel of the machine from first touch.",
)
.or(Absent::Rule(
    "0 mm, unless installed_force or installed_length is given",
));
static INSTALLED_FORCE: Field = Field::new(
    "installed_force",
    Kind::Quantity(Dimension::FORCE, Range::NotNegative),
    "820 N",
    "Force as installed, instead of the deflection. The straight spring's rate and what the seats give axially turn it into travel.",
)
.or(Absent::Nothing);
static INSTALLED_LENGTH: Field = Field::new(
    "installed_length",
    LENGTH,
    "170 mm",
    "Length as installed, instead of the deflection: free length at service temperature less travel.",
)
.or(Absent::Nothing);
static WORKING_DEFLECTION: Field = Field::new(
    "working_deflection",
    LENGTH,
    "95 mm",
    "Largest deflection in service, as travel of the machine from first touch.",
)
.or(Absent::Nothing);
static WORKING_FORCE: Field = Field::new(
    "working_force",
    Kind::Quantity(Dimension::FORCE, Range::Positive),
    "1950 N",
    "Largest force in service, instead of the deflection. With loading = \"force\", the dead weight.",
)
.or(Absent::Nothing);
static WORKING_LENGTH: Field = Field::new(
    "working_length",
    LENGTH,
    "115 mm",
    "Shortest length in service, instead of the deflection: free length at service temperature less travel.",
)
.or(Absent::Nothing);
static WORKING_TOLERANCE: Field = Field::new(
    "working_tolerance",
    TRAVEL,
    "2 mm",
    "Half the tolerance band of the working deflection: added to it in every margin.",
)
.or(Absent::Value("0 mm"));
static OVERTRAVEL: Field = Field::new(
    "overtravel",
    TRAVEL,
    "5 mm",
    "Travel beyond the working deflection that must be survived, without further margin.",
)
.or(Absent::Value("0 mm"));
static REQUIRED_MARGIN: Field = Field::new(
    "required_margin",
    MARGIN,
    "0.15",
    "Margin required of every limit: its deflection / working deflection - 1. The default is common practice, no source.",
)
.or(Absent::Value("0.15"));
static BOW_LIMIT: Field = Field::new("bow_limit", LENGTH, "6 mm", "Largest sideways bow allowed.")
    .or(Absent::Rule("0.1 of the mean diameter"));
static RATE_LOSS_SHARE: Field = Field::new(
    "rate_loss_share",
    Kind::Share(Range::ProperShare),
    "0.05",
    "Share of the axial rate that may be lost to bowing.",
)
.or(Absent::Value("0.05"));
static ALLOWABLE_STRESS: Field = Field::new(
    "allowable_stress",
    Kind::Quantity(Dimension::STRESS, Range::Positive),
    "700 MPa",
    "Allowable static shear stress of the wire. Left out, stress is not checked.",
)
.or(Absent::Nothing);
static MARGINS: Field = Field::new(
    "margins",
    Kind::Table(&MARGIN_FORM),
    "",
    "Margins required of single limits, instead of required_margin: margins = { solid = 0.05 }.",
)
.or(Absent::Nothing);

static CRITICAL: Field = margin("critical", "The perfect column as built turns unstable.");
static DEAD_LOAD_LOST: Field = margin("dead_load_lost", "A dead load is lost.");
static TRAVEL_LOST: Field = margin("travel_lost", "A set travel is lost.");
static BOW: Field = margin("bow", "The bow limit.");
static RATE_LOST: Field = margin("rate_lost", "The axial rate has lost its share.");
static STRESS: Field = margin("stress", "The allowable stress.");
static CLASH: Field = margin("clash", "The first coils touch on the inside of the bow.");
static LIFT_OFF: Field = margin("lift_off", "An end lifts off its flat seat.");
static SLIDE: Field = margin("slide", "An end slides on its flat seat.");
static GUIDE_TOUCH: Field = margin(
    "guide_touch",
    "The spring touches a guide that it may not touch.",
);
static BORE_FILLED: Field = margin(
    "bore_filled",
    "The coil, grown by compression, fills its bore.",
);
static SOLID: Field = margin("solid", "The spring is solid.");

const fn margin(key: &'static str, doc: &'static str) -> Field {
    Field::new(key, MARGIN, "0.05", doc).or(Absent::Nothing)
}

static MARGIN_FORM: Form = Form {
    doc: "Margins required of single limits.",
    fields: &[
        &CRITICAL,
        &DEAD_LOAD_LOST,
        &TRAVEL_LOST,
        &BOW,
        &RATE_LOST,
        &STRESS,
        &CLASH,
        &LIFT_OFF,
        &SLIDE,
        &GUIDE_TOUCH,
        &BORE_FILLED,
        &SOLID,
    ],
    rules: &[],
};

pub(super) static FORM: Form = Form {
    doc: "What the spring must do. Deflections are travel of the machine from first touch: axially \
          soft seats take their part of it.",
    fields: &[
        &LOADING,
        &INSTALLED_DEFLECTION,
        &INSTALLED_FORCE,
        &INSTALLED_LENGTH,
        &WORKING_DEFLECTION,
        &WORKING_FORCE,
        &WORKING_LENGTH,
        &WORKING_TOLERANCE,
        &OVERTRAVEL,
        &REQUIRED_MARGIN,
        &MARGINS,
        &BOW_LIMIT,
        &RATE_LOSS_SHARE,
        &ALLOWABLE_STRESS,
    ],
    rules: &[
        Rule::AtMostOneOf(&[&INSTALLED_DEFLECTION, &INSTALLED_FORCE, &INSTALLED_LENGTH]),
        Rule::OneOf(&[&WORKING_DEFLECTION, &WORKING_FORCE, &WORKING_LENGTH]),
        Rule::Demands {
            field: &LOADING,
            word: "force",
            needed: &WORKING_FORCE,
        },
    ],
};

/// Reads the duty of `spring` between its `seats`. Where these are not known, for their own
/// mistakes, what can be checked without them is checked.
pub(super) fn duty(
    filled: &Filled,
    spring: Option<&Spring>,
    seats: [Option<&Support>; 2],
    log: &mut Log,
) -> Option<Duty> {
    let loading = filled.word(&LOADING, log).map(|word| match word.as_str() {
        "force" => Loading::Force,
        _ => Loading::Deflection,
    });
    let machine = Machine::of(spring, seats);
    let installed = installed(filled, &machine, log);
    let working = working(filled, &machine, log);
    if let (Some(installed), Some((working, field))) = (installed, working) {
        machine.check(filled, installed, working, field, log);
    }
    let tolerance = filled.number(&WORKING_TOLERANCE, log);
    let overtravel = filled.number(&OVERTRAVEL, log);
    let general = filled.number(&REQUIRED_MARGIN, log);
    let own = own_margins(filled, log);
    if let Some(margin) = general {
        doubt_margin(margin, |meant| format!("required_margin = {meant}"), log);
    }
    for (kind, margin) in &own {
        let key = kind.key();
        doubt_margin(
            *margin,
            |meant| format!("margins = {{ {key} = {meant} }}"),
            log,
        );
    }
    let bow_limit = if filled.is_given(&BOW_LIMIT) {
        filled.number(&BOW_LIMIT, log)
    } else {
        filled.note_default(&BOW_LIMIT, log);
        spring.map(|spring| 0.1 * spring.mean_diameter)
    };
    let rate_loss_share = filled.number(&RATE_LOSS_SHARE, log);
    Some(Duty {
        loading: loading?,
        installed_deflection: installed?,
        working_deflection: working?.0,
        working_force: filled.number(&WORKING_FORCE, log),
        working_tolerance: tolerance?,
        overtravel: overtravel?,
        margins: Margins {
            general: general?,
            own,
        },
        bow_limit: bow_limit?,
        rate_loss_share: rate_loss_share?,
        allowable_stress: filled.number(&ALLOWABLE_STRESS, log),
    })
}

/// Margins above this are probably percentages that lack their sign.
const LARGEST_USUAL_MARGIN: f64 = 3.0;

fn doubt_margin(margin: f64, line: impl Fn(&str) -> String, log: &mut Log) {
    if margin > LARGEST_USUAL_MARGIN {
        let meant = significant(0.01 * margin, 6);
        let meant = meant.trim_end_matches('0').trim_end_matches('.');
        log.warnings.push(format!(
            "a margin of {margin} is {} %: if {margin} % was meant, write {}",
            100.0 * margin,
            line(meant)
        ));
    }
}

fn own_margins(filled: &Filled, log: &mut Log) -> Vec<(LimitKind, f64)> {
    let Some(margins) = filled.table(&MARGINS) else {
        return Vec::new();
    };
    LimitKind::ALL
        .into_iter()
        .filter_map(|kind| {
            let field = MARGIN_FORM.fields.iter().find(|f| f.key == kind.key())?;
            Some((kind, margins.number(field, log)?))
        })
        .collect()
}

/// What the straight spring between its seats makes of forces and lengths.
struct Machine {
    free_length: Option<Metre>,
    /// Rate of the spring, N/m.
    rate: Option<NewtonPerMetre>,
    /// How both seats give axially; `None` where one is not known.
    seats: Option<[Restraint; 2]>,
}

impl Machine {
    fn of(spring: Option<&Spring>, seats: [Option<&Support>; 2]) -> Self {
        let both = || Some([seats[0]?.axial, seats[1]?.axial]);
        Machine {
            free_length: spring.map(|spring| spring.free_length),
            rate: spring.map(Spring::rate),
            seats: both(),
        }
    }

    /// Travel under a force: what the straight spring and both seats give, added up.
    fn travel_at(&self, force: Newton) -> Option<Metre> {
        let [bottom, top] = self.seats?.map(|seat| seat.gives_under(force).0);
        Some(force / self.rate? + bottom + top)
    }

    /// How much the spring itself is compressed at `travel`: the root of the travel at the force of
    /// that compression, which rises with it, by halving.
    fn compression_at(&self, travel: Metre) -> Option<Metre> {
        let rate = self.rate?;
        let (mut low, mut high) = (0.0, travel);
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if self.travel_at(rate * middle)? < travel {
                low = middle;
            } else {
                high = middle;
            }
        }
        Some(high)
    }

    fn check(
        &self,
        filled: &Filled,
        installed: Metre,
        working: Metre,
        field: &'static Field,
        log: &mut Log,
    ) {
        let place = filled.at(field);
        if let (Some(compression), Some(free_length)) =
            (self.compression_at(working), self.free_length)
            && compression > free_length
        {
            log.mistakes.push(Mistake::at(
                place.clone(),
                format!(
                    "the working deflection, {}, would compress the spring by more than its free length, {}",
                    MILLIMETRE.show(working, 4),
                    MILLIMETRE.show(free_length, 4)
                ),
                "a spring stops at its solid length at the latest: check the duty and the spring's rate",
            ));
        }
        if installed > working {
            let installed_field = [&INSTALLED_DEFLECTION, &INSTALLED_FORCE, &INSTALLED_LENGTH]
                .into_iter()
                .find(|f| filled.is_given(f))
                .unwrap_or(&INSTALLED_DEFLECTION);
            log.mistakes.push(
                Mistake::at(
                    place,
                    format!(
                        "the working deflection, {}, is less than the installed one, {}",
                        MILLIMETRE.show(working, 4),
                        MILLIMETRE.show(installed, 4)
                    ),
                    "working is the most compressed state in service: check both",
                )
                .also(filled.at(installed_field), "as installed"),
            );
        }
    }
}

fn installed(filled: &Filled, machine: &Machine, log: &mut Log) -> Option<Metre> {
    if filled.is_given(&INSTALLED_DEFLECTION) {
        filled.number(&INSTALLED_DEFLECTION, log)
    } else if filled.is_given(&INSTALLED_FORCE) {
        let force = filled.number(&INSTALLED_FORCE, log)?;
        machine.travel_at(force)
    } else if filled.is_given(&INSTALLED_LENGTH) {
        let free_length = machine.free_length?;
        let travel = free_length - filled.number(&INSTALLED_LENGTH, log)?;
        if travel < 0.0 {
            log.mistakes
                .push(loose(filled, &INSTALLED_LENGTH, free_length));
            return None;
        }
        Some(travel)
    } else {
        filled.note_default(&INSTALLED_DEFLECTION, log);
        Some(0.0)
    }
}

/// Working deflection, and the field that gave it.
fn working(filled: &Filled, machine: &Machine, log: &mut Log) -> Option<(Metre, &'static Field)> {
    if filled.is_given(&WORKING_DEFLECTION) {
        let travel = filled.number(&WORKING_DEFLECTION, log)?;
        Some((travel, &WORKING_DEFLECTION))
    } else if filled.is_given(&WORKING_FORCE) {
        let force = filled.number(&WORKING_FORCE, log)?;
        Some((machine.travel_at(force)?, &WORKING_FORCE))
    } else {
        let free_length = machine.free_length?;
        let travel = free_length - filled.number(&WORKING_LENGTH, log)?;
        if travel <= 0.0 {
            log.mistakes
                .push(loose(filled, &WORKING_LENGTH, free_length));
            return None;
        }
        Some((travel, &WORKING_LENGTH))
    }
}

fn loose(filled: &Filled, field: &'static Field, free_length: Metre) -> Mistake {
    Mistake::at(
        filled.at(field),
        format!(
            "at this length the spring would lie loose: its free length is {} at service temperature",
            MILLIMETRE.show(free_length, 4)
        ),
        "give the compressed length; it is shorter than the free one",
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_limit_can_have_its_own_margin() {
        let keys: Vec<_> = MARGIN_FORM.fields.iter().map(|f| f.key).collect();
        assert_eq!(keys, LimitKind::ALL.map(LimitKind::key));
    }
}
