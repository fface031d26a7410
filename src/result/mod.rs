//! Plain data that comes out: paths, critical points, limits, verdicts, the echo of the setup.
//! Everything here is what `--format json` prints; `None` becomes `null` and means "never" or
//! "does not apply".

mod assessment;
mod echo;
mod ends;
mod outcome;
mod path;
mod wires;

pub use assessment::{
    AbsoluteStability, Assessment, ClosedForm, ClosedFormCurve, Comparison, Computed, DeadLoad,
    Failure, ImperfectColumn, Limit, Measure, Side, Snap, Southwell, StraightColumn, StressAtSolid,
    Verdict,
};
pub use echo::{
    DutyEcho, ForceLawPoint, GuideEcho, ImperfectionEcho, LateralEcho, LinkEcho, MomentLawPoint,
    MotionEcho, MotionPoint, SpringEcho, SupportEcho, SupportsEcho,
};
pub use ends::{EffectiveEndConstant, PlaneAnswer, Sensitivities, SupportSensitivity};
pub use outcome::{Mistake, Outcome, Refusal};
pub use path::{Mark, Path, PathPoint};
pub use wires::{WireMaterial, wire_materials};

pub use crate::setup::LimitKind;
