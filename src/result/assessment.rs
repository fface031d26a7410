//! The answer to one case.

use super::{
    DutyEcho, EffectiveEndConstant, GuideAnswer, GuideEcho, ImperfectionEcho, Path, PlaneAnswer,
    SeatLoad, Sensitivities, SpringEcho, Stroke, SupportsEcho,
};
use crate::setup::LimitKind;
use crate::units::{Joule, Metre, Newton, Pascal};
use serde::{Serialize, Serializer};

impl Serialize for LimitKind {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_str(self.key())
    }
}

/// The answer.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Verdict {
    /// Every limit has its required margin and lies beyond the overtravel.
    Holds,
    /// At least one limit has not.
    DoesNotHold,
    /// A computation failed, or its error is as large as what is to be decided.
    Undecided,
}

/// One deflection in the ways people quote it.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Measure {
    /// Deflection, m (travel of the machine).
    pub deflection_m: Metre,
    /// Shortening of the spring over its free length (without what soft seats give).
    pub share_of_free_length: f64,
    /// Axial force there, N.
    pub force_n: Newton,
    /// Deflection / (working deflection + its tolerance) − 1; under a dead load the same ratio of
    /// forces.
    pub margin: f64,
}

/// A computed deflection with its error estimate.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Computed {
    /// The value.
    #[serde(flatten)]
    pub measure: Measure,
    /// Error estimate of the deflection, m: difference of two meshes plus the refinement's floor.
    pub error_m: Metre,
}

/// The closed form with one end constant.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct ClosedFormCurve {
    /// End constant α.
    pub end_constant: f64,
    /// Who prints this constant.
    pub source: String,
    /// Critical deflection, m; `null`: never (absolutely stable).
    pub critical_deflection_m: Option<Metre>,
    /// The critical deflection in full; `null`: never.
    pub critical: Option<Measure>,
    /// Whether the critical deflection lies beyond solid: "none before solid".
    pub beyond_solid: bool,
    /// Free length below which the formula promises absolute stability, m.
    pub absolute_stability_below_m: Option<Metre>,
}

/// What the handbook's formula says.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct ClosedForm {
    /// End constant α of the first curve; `null`: no closed form covers this support.
    pub end_constant: Option<f64>,
    /// Critical deflection by the first curve, m.
    pub critical_deflection_m: Option<Metre>,
    /// Every curve that the handbooks give: two where they differ (0.7 and 0.707).
    pub curves: Vec<ClosedFormCurve>,
    /// The formula with its source, or that no closed form covers this support.
    pub note: String,
    /// What of the case neither closed form nor straight column sees, each in a sentence.
    pub unseen: Vec<String>,
}

/// The straight, perfect column with the whole free length deformable (the formula's
/// idealisation) between the case's supports.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct StraightColumn {
    /// Critical deflection, m; `null`: never.
    pub critical_deflection_m: Option<Metre>,
    /// Critical force, N; `null`: never.
    pub critical_force_n: Option<Newton>,
    /// Error estimate of the critical deflection, m; `null` where there is none.
    pub error_m: Option<Metre>,
    /// The critical deflection in full; `null`: never.
    pub critical: Option<Computed>,
    /// Whether it lies beyond solid: "none before solid".
    pub beyond_solid: bool,
    /// Where the column straightens again, m, if it does before it is fully compressed.
    pub straightens_again_at_m: Option<Metre>,
}

/// The Southwell estimate from the path before the bow-out.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Southwell {
    /// Estimated critical deflection, m.
    pub deflection_m: Metre,
    /// Coefficient of determination of the straight line.
    pub r_squared: f64,
    /// Number of path points used.
    pub points: usize,
}

/// The column as built and imperfect.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct ImperfectColumn {
    /// The first of its limits (bow, rate, stress, clash, load lost), in full; `null`: none before solid.
    pub first_limit: Option<Computed>,
    /// Which of its limits that is.
    pub first_limit_name: Option<LimitKind>,
    /// Bow at the working deflection (tolerance included), m; `null` where the path does not reach it.
    pub bow_at_working_m: Option<Metre>,
    /// Error estimate of that bow, m.
    pub bow_at_working_error_m: Option<Metre>,
    /// Wire stress at the working deflection, Pa.
    pub stress_at_working_pa: Option<Pascal>,
    /// How the deviations lie to one another in the worst way, in words; `null` where there is
    /// only one way.
    pub worst_orientation: Option<String>,
    /// Number of ways that were tried.
    pub orientations_tried: usize,
    /// Southwell estimate; `null` where the path gives none.
    pub southwell: Option<Southwell>,
    /// Which branch the path took, in words.
    pub branch: String,
    /// Elements of the finer mesh.
    pub elements: usize,
    /// The load path. Written as CSV and drawn; not part of the JSON.
    #[serde(skip)]
    pub path: Path,
}

/// A limit of the usable deflection.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Limit {
    /// Which limit.
    pub name: LimitKind,
    /// Deflection at which it is reached, m; `null`: not before solid, not as far as the path goes
    /// (`looked_up_to_m`), or not checked.
    pub deflection_m: Option<Metre>,
    /// Shortening of the spring over its free length (without what soft seats give).
    pub share_of_free_length: Option<f64>,
    /// Axial force there, N.
    pub force_n: Option<Newton>,
    /// Deflection / (working deflection + tolerance) − 1, under a dead load the same ratio of
    /// forces; `null`: not reached.
    pub margin: Option<f64>,
    /// Margin required of this limit.
    pub required_margin: f64,
    /// Error estimate, m; `null` where nothing is computed.
    pub error_m: Option<Metre>,
    /// Whether it is told for information only: nothing is required of it, and it does not govern. The
    /// critical deflection of the perfect column is, where a guide is there to be leaned on.
    pub for_information: bool,
    /// Whether it is the governing limit.
    pub governs: bool,
    /// Whether it lies beyond solid, so that the spring never gets there.
    pub beyond_solid: bool,
    /// For a limit not found: how far the path is known, m, where that is short of solid.
    pub looked_up_to_m: Option<Metre>,
    /// Which model it belongs to, and what was assumed, in words.
    pub note: String,
}

/// On which side of the column the formula lies.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Side {
    /// The formula promises less than the column.
    Safe,
    /// The formula promises more than the column.
    Unsafe,
    /// Equal within the column's error.
    Equal,
}

/// Formula against straight column, for one end constant.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Comparison {
    /// End constant of the formula.
    pub end_constant: f64,
    /// formula/column − 1; `null` where one of them says "never".
    pub relative_difference: Option<f64>,
    /// On which side the formula lies.
    pub side: Side,
    /// The finding in a sentence.
    pub sentence: String,
}

/// What happens under a dead load. All `null` but the first two: the force rises along the path.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct DeadLoad {
    /// How far the path is known, m, where it ends short of solid.
    pub path_ends_at_m: Option<Metre>,
    /// The largest force the path carries, N.
    pub lost_at_force_n: Option<Newton>,
    /// Deflection at which it is lost, m.
    pub lost_at_deflection_m: Option<Metre>,
    /// Deflection at which the spring comes to rest under the same force, m.
    pub rests_at_deflection_m: Option<Metre>,
    /// Whether it rests solid, for want of a stable state before.
    pub rests_solid: bool,
    /// How far it jumps, m.
    pub jump_m: Option<Metre>,
    /// Energy freed by the jump, J: work of the load less the strain energy gained.
    pub energy_freed_j: Option<Joule>,
    /// Whether coils clash on the way: from there on the column model is a guide only.
    pub clash_on_the_way: bool,
}

/// What happens when a set deflection is lost: the spring snaps sideways, its travel held.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Snap {
    /// Travel at which it snaps, m.
    pub lost_at_deflection_m: Metre,
    /// Force just before, N.
    pub force_before_n: Newton,
    /// Force in the next stable state at the same travel, N; `null`: none on the path.
    pub force_after_n: Option<Newton>,
    /// Whether that state is solid, for want of a stable one before.
    pub rests_solid: bool,
    /// Bow just before, m.
    pub bow_before_m: Metre,
    /// Bow in that state, m.
    pub bow_after_m: Option<Metre>,
    /// Energy freed, J, soft seats included.
    pub energy_freed_j: Option<Joule>,
    /// Whether coils clash on the way: from there on the column model is a guide only.
    pub clash_on_the_way: bool,
}

/// Absolute stability: no buckling at any deflection.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct AbsoluteStability {
    /// Whether the formula promises it (first constant); `null` where no closed form covers the support.
    pub formula: Option<bool>,
    /// Free length below which it would begin by the formula, m.
    pub formula_below_m: Option<Metre>,
    /// Whether the straight column has it.
    pub column: bool,
    /// Free length below which it would begin for the straight column, rate, diameter and
    /// supports kept, m; `null`: at no length.
    pub column_below_m: Option<Metre>,
    /// Error estimate of that, m.
    pub column_below_error_m: Option<Metre>,
    /// The same in a sentence.
    pub sentence: String,
}

/// Wire stress with the spring pressed solid.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct StressAtSolid {
    /// Corrected shear stress of the straight spring at solid, Pa.
    pub stress_pa: Pascal,
    /// Allowable, Pa.
    pub allowable_pa: Option<Pascal>,
    /// Whether it stays within the allowable; `null` where none is given.
    pub within: Option<bool>,
}

/// A computation that did not come to an end.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Failure {
    /// Which computation.
    pub what: String,
    /// Why it stopped, and what was tried.
    pub cause: String,
    /// Deflection of the last good point, m.
    pub last_good_deflection_m: Option<Metre>,
}

/// The answer to one case.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Assessment {
    /// Title of the case.
    pub title: String,
    /// File of the case, as given on the command line.
    pub file: String,
    /// The answer.
    pub verdict: Verdict,
    /// The limit that governs: the one with the least to spare against what is required of it.
    pub governing: Option<LimitKind>,
    /// The answer in one or two sentences, to be read aloud.
    pub sentence: String,
    /// Why it could not be decided; `null` where it was.
    pub undecided_reason: Option<String>,
    /// The spring as resolved.
    pub spring: SpringEcho,
    /// The supports as resolved.
    pub supports: SupportsEcho,
    /// The guides as resolved.
    pub guides: Vec<GuideEcho>,
    /// The imperfections as resolved.
    pub imperfections: ImperfectionEcho,
    /// The duty as resolved.
    pub duty: DutyEcho,
    /// Inputs taken by default.
    pub defaulted: Vec<String>,
    /// The answers of the two lateral planes; empty where the supports are alike all round. All
    /// else is of the weaker plane.
    pub planes: Vec<PlaneAnswer>,
    /// Handbook.
    pub closed_form: ClosedForm,
    /// Straight column with the formula's idealisation.
    pub straight_column: StraightColumn,
    /// The end constant that stands for these supports.
    pub effective_end_constant: EffectiveEndConstant,
    /// Column as built, imperfect.
    pub imperfect_column: Option<ImperfectColumn>,
    /// Formula against column.
    pub comparisons: Vec<Comparison>,
    /// Limits, by deflection; those never reached last.
    pub limits: Vec<Limit>,
    /// Under a dead load; `null` where the duty sets the deflection.
    pub dead_load: Option<DeadLoad>,
    /// Where a set deflection is lost; `null` where it is not, or under a dead load.
    pub snap: Option<Snap>,
    /// What the guides do; `null` without guides, or where there is no path.
    pub guide_answer: Option<GuideAnswer>,
    /// What the bottom and the top seat bear; `null` where the path does not reach the installed
    /// deflection.
    pub seat_loads: Option<[SeatLoad; 2]>,
    /// The stroke with friction; `null` without friction, or where the path does not lead to the
    /// largest working deflection.
    pub stroke: Option<Stroke>,
    /// Absolute stability.
    pub absolute_stability: AbsoluteStability,
    /// How the critical deflection hangs on the supports; `null` where nothing of them can change.
    pub support_sensitivity: Option<Sensitivities>,
    /// Wire stress at solid.
    pub stress_at_solid: StressAtSolid,
    /// Computations that failed.
    pub failures: Vec<Failure>,
    /// Warnings and assumptions to know of.
    pub warnings: Vec<String>,
}
