//! What the spring must do.

use crate::units::{Metre, Newton, Pascal};

/// What drives the spring.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Loading {
    /// A machine sets the deflection.
    Deflection,
    /// A dead weight sets the force.
    Force,
}

/// The limits of the usable deflection.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum LimitKind {
    /// The perfect column as built loses its straight state.
    Critical,
    /// A dead load is lost at the path's largest force.
    DeadLoadLost,
    /// A set deflection is lost at the path's largest travel.
    TravelLost,
    /// The bow reaches its limit.
    Bow,
    /// The axial rate has lost its share.
    RateLost,
    /// The wire's static shear stress reaches the allowable.
    Stress,
    /// The first coils touch on the inside of the bow.
    Clash,
    /// The far side of a flat end lifts off its seat.
    LiftOff,
    /// An end slides on its seat.
    Slide,
    /// The spring touches a guide that it may not touch.
    GuideTouch,
    /// The coil, grown by compression, fills its bore.
    BoreFilled,
    /// The spring is solid.
    Solid,
}

impl LimitKind {
    /// Every limit, in the order the documentation lists them.
    pub const ALL: [LimitKind; 12] = [
        LimitKind::Critical,
        LimitKind::DeadLoadLost,
        LimitKind::TravelLost,
        LimitKind::Bow,
        LimitKind::RateLost,
        LimitKind::Stress,
        LimitKind::Clash,
        LimitKind::LiftOff,
        LimitKind::Slide,
        LimitKind::GuideTouch,
        LimitKind::BoreFilled,
        LimitKind::Solid,
    ];

    /// Whether it is the loss of the load or of the travel itself.
    pub fn is_loss(self) -> bool {
        matches!(self, LimitKind::DeadLoadLost | LimitKind::TravelLost)
    }

    /// Key used in case files and in JSON.
    pub fn key(self) -> &'static str {
        match self {
            LimitKind::Critical => "critical",
            LimitKind::DeadLoadLost => "dead_load_lost",
            LimitKind::TravelLost => "travel_lost",
            LimitKind::Bow => "bow",
            LimitKind::RateLost => "rate_lost",
            LimitKind::Stress => "stress",
            LimitKind::Clash => "clash",
            LimitKind::LiftOff => "lift_off",
            LimitKind::Slide => "slide",
            LimitKind::GuideTouch => "guide_touch",
            LimitKind::BoreFilled => "bore_filled",
            LimitKind::Solid => "solid",
        }
    }

    /// Name shown to people.
    pub fn title(self) -> &'static str {
        match self {
            LimitKind::Critical => "critical, perfect column as built",
            LimitKind::DeadLoadLost => "dead load lost",
            LimitKind::TravelLost => "set travel lost",
            LimitKind::Bow => "bow limit",
            LimitKind::RateLost => "axial rate lost",
            LimitKind::Stress => "static wire stress",
            LimitKind::Clash => "first coils clash",
            LimitKind::LiftOff => "end lifts off its seat",
            LimitKind::Slide => "end slides on its seat",
            LimitKind::GuideTouch => "touches a guide",
            LimitKind::BoreFilled => "coil fills the bore",
            LimitKind::Solid => "solid",
        }
    }
}

/// The margin required of each limit: limit deflection / largest working deflection − 1.
#[derive(Clone, Debug, PartialEq)]
pub struct Margins {
    /// Required of every limit that has none of its own.
    pub general: f64,
    /// Limits with a requirement of their own.
    pub own: Vec<(LimitKind, f64)>,
}

impl Margins {
    /// The margin required of `limit`.
    pub fn of(&self, limit: LimitKind) -> f64 {
        self.own
            .iter()
            .find(|(kind, _)| *kind == limit)
            .map_or(self.general, |(_, margin)| *margin)
    }
}

/// What the spring must do. Deflections are travel of the machine from first touch, so they
/// include what axially soft seats give.
#[derive(Clone, Debug, PartialEq)]
pub struct Duty {
    /// What drives the spring.
    pub loading: Loading,
    /// Deflection as installed, m.
    pub installed_deflection: Metre,
    /// Working deflection, m.
    pub working_deflection: Metre,
    /// The working force, N, where the duty was given as a force: always, under a dead load.
    pub working_force: Option<Newton>,
    /// Tolerance on the working deflection, m (half the band): added to it in every margin.
    pub working_tolerance: Metre,
    /// Travel beyond the working deflection that must be survived, m, without further margin.
    pub overtravel: Metre,
    /// Margins required.
    pub margins: Margins,
    /// Largest bow allowed, m. Default 0.1 D.
    pub bow_limit: Metre,
    /// Share of the axial rate that may be lost. Default 0.05.
    pub rate_loss_share: f64,
    /// Allowable static shear stress of the wire, Pa; `None`: not checked.
    pub allowable_stress: Option<Pascal>,
}

impl Duty {
    /// Working deflection with its tolerance, m: what margins are taken against.
    pub fn largest_working_deflection(&self) -> Metre {
        self.working_deflection + self.working_tolerance
    }

    /// Deflection that a limit must at least reach, m, as counted by [`Duty::reached`].
    pub fn needed(&self, limit: LimitKind) -> Metre {
        let working = self.largest_working_deflection();
        (working * (1.0 + self.margins.of(limit))).max(working + self.overtravel)
    }

    /// What a state counts for against the working deflection, m. Where a machine sets the
    /// deflection: that deflection. Under a dead load: the deflection that its force would give the
    /// straight spring, so that ratios are ratios of forces; a bowed spring is shorter than that.
    pub fn reached(&self, deflection: Metre, force: Newton) -> Metre {
        match (self.loading, self.working_force) {
            (Loading::Force, Some(working)) => force * self.working_deflection / working,
            _ => deflection,
        }
    }

    /// Margin of a state: [`Duty::reached`] over the largest working deflection, less 1.
    pub fn margin(&self, deflection: Metre, force: Newton) -> f64 {
        self.reached(deflection, force) / self.largest_working_deflection() - 1.0
    }

    /// Whether that limit exists under this kind of loading, in supports and guides that have it.
    pub fn has(&self, limit: LimitKind) -> bool {
        match limit {
            LimitKind::DeadLoadLost => self.loading == Loading::Force,
            LimitKind::TravelLost => self.loading == Loading::Deflection,
            _ => true,
        }
    }
}
