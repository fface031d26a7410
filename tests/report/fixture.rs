//! Invented assessments of the shape that the real ones have. The numbers are made up by a
//! two-term imperfect pitchfork, not computed by the model.

use coilstay::result::*;

/// How the made-up path goes on after the bow-out.
#[derive(Clone, Copy, Debug)]
pub enum Shape {
    /// Force and deflection rise on.
    Rising,
    /// The force falls.
    Falling,
    /// Only the first tenth of the way.
    Short,
    /// No imperfection: straight to solid.
    Straight,
}

const RATE: f64 = 8150.0;
const FREE: f64 = 0.160;
const CRITICAL: f64 = 0.0482;
const SOLID: f64 = 0.112;
const WORKING: f64 = 0.040;
const TOLERANCE: f64 = 0.0005;

fn measure(deflection_m: f64, force_n: f64) -> Measure {
    Measure {
        deflection_m,
        share_of_free_length: deflection_m / FREE,
        force_n,
        margin: deflection_m / (WORKING + TOLERANCE) - 1.0,
    }
}

/// A path point; `bow` in metres.
fn point(deflection_m: f64, force_n: f64, bow_m: f64) -> PathPoint {
    PathPoint {
        deflection_m,
        shortening_m: deflection_m,
        force_n,
        bow_m,
        bow_place: 0.5,
        lateral_m: bow_m,
        bottom_rotation_rad: 0.0,
        top_rotation_rad: 0.0,
        bottom_moment_n_m: 0.4 * force_n * bow_m,
        top_moment_n_m: -0.4 * force_n * bow_m,
        transverse_force_n: 0.02 * force_n,
        bottom_thrust_n: 0.02 * force_n,
        top_thrust_n: -0.02 * force_n,
        bottom_line_m: (force_n != 0.0).then_some(0.4 * bow_m),
        top_line_m: (force_n != 0.0).then_some(-0.4 * bow_m),
        bottom_lift_rad: 0.0,
        top_lift_rad: 0.0,
        guide_room_m: None,
        guide_tightest_place: None,
        guide_force_n: 0.0,
        guide_coil_force_n: 0.0,
        guide_coil_place: 0.0,
        guide_places: 0,
        guide_longest_m: 0.0,
        guide_corner_force_n: 0.0,
        guide_friction_n: 0.0,
        rate_n_per_m: RATE,
        wire_stress_pa: 1.9e6 * force_n,
        unstable_set_deflection: 0,
        unstable_dead_load: 0,
    }
}

/// The point with bow `q` of an imperfect pitchfork.
fn bowed(shape: Shape, q: f64) -> PathPoint {
    let flaw = 0.00035;
    let (force_slope, deflection_slope) = match shape {
        Shape::Falling => (-900.0, 320.0),
        _ => (90.0, 520.0),
    };
    let share = q / (q + flaw);
    let deflection = CRITICAL * share * (1.0 + deflection_slope * q * q);
    let force = RATE * CRITICAL * share * (1.0 + force_slope * q * q);
    point(deflection, force, q)
}

fn path(shape: Shape) -> Path {
    let (points, marks): (Vec<PathPoint>, Vec<Mark>) = match shape {
        Shape::Straight => {
            let at = |deflection: f64| point(deflection, RATE * deflection, 0.0);
            (
                (0..=80).map(|i| at(SOLID * f64::from(i) / 80.0)).collect(),
                vec![
                    mark("installed", at(0.012)),
                    mark("working", at(WORKING)),
                    mark("solid", at(SOLID)),
                ],
            )
        }
        Shape::Short => (
            (0..=5).map(|i| bowed(shape, 1e-5 * f64::from(i))).collect(),
            vec![],
        ),
        _ => {
            let at = |q| bowed(shape, q);
            let mut marks = vec![
                mark("installed", at(0.000115)),
                mark("working", at(0.00175)),
                mark("bow", at(0.0028)),
                mark("rate_lost", at(0.0008)),
                mark("clash", at(0.0155)),
            ];
            if let Shape::Falling = shape {
                marks.push(mark("largest_force", at(0.0058)));
                marks.push(mark("dead_load_lost", at(0.0058)));
            }
            marks.sort_by(|a, b| a.point.bow_m.total_cmp(&b.point.bow_m));
            (
                (0..=120)
                    .map(|i| bowed(shape, 0.022 * (f64::from(i) / 120.0).powi(2)))
                    .collect(),
                marks,
            )
        }
    };
    Path {
        points,
        marks,
        branch: "the branch that the imperfections choose, through the bow-out".into(),
    }
}

fn mark(name: &str, point: PathPoint) -> Mark {
    Mark {
        name: name.into(),
        point,
    }
}

fn limit(name: LimitKind, at: Option<(f64, f64)>, note: &str) -> Limit {
    let found = at.map(|(deflection, force)| measure(deflection, force));
    Limit {
        name,
        deflection_m: found.map(|m| m.deflection_m),
        share_of_free_length: found.map(|m| m.share_of_free_length),
        force_n: found.map(|m| m.force_n),
        margin: found.map(|m| m.margin),
        required_margin: if name == LimitKind::Stress {
            0.05
        } else {
            0.15
        },
        error_m: found.map(|_| 2.3e-12),
        for_information: false,
        governs: false,
        beyond_solid: false,
        looked_up_to_m: None,
        note: note.into(),
    }
}

fn support(kind: &str) -> SupportEcho {
    SupportEcho {
        kind: kind.into(),
        rotational_stiffness_n_m_per_rad: if kind == "hinged" { Some(0.0) } else { None },
        sideways_stiffness_n_per_m: None,
        axial_stiffness_n_per_m: None,
        rotational_law: None,
        sideways_law: None,
        axial_law: None,
        arm_m: 0.0,
        tilt_rad: 0.0,
        offset_m: 0.0,
        contact: "joined".into(),
        seat_radius_m: None,
        seat_edge_m: None,
        ground_share: None,
        friction: None,
        swivel_radius_m: None,
        link: None,
        motion: None,
        other_plane: None,
        plane_rad: 0.0,
    }
}

fn spring() -> SpringEcho {
    SpringEcho {
        wire_section: "round".into(),
        wire_diameter_m: 0.004,
        wire_axial_size_m: 0.004,
        mean_diameter_m: 0.028,
        outer_diameter_m: 0.032,
        inner_diameter_m: 0.024,
        spring_index: 7.0,
        free_length_m: FREE,
        slenderness: FREE / 0.028,
        active_coils: 10.0,
        total_coils: 12.0,
        pitch_m: 0.0152,
        ends: "closed-ground".into(),
        hand: "right".into(),
        material: "oil-tempered-steel".into(),
        service_temperature_degc: 20.0,
        youngs_modulus_pa: 206e9,
        shear_modulus_pa: 81.5e9,
        rate_n_per_m: RATE,
        rate_is_measured: false,
        formula_rate_n_per_m: RATE,
        solid_length_m: FREE - SOLID,
        solid_rule: "ground ends: total coils × wire (Shigley, table of spring ends, from memory)"
            .into(),
        dead_height_m: 0.008,
        deformable_length_m: 0.152,
        axial_stiffness_n: RATE * FREE,
        shear_stiffness_n: 3296.0,
        bending_stiffness_n_m2: 0.2857,
    }
}

fn duty(shape: Shape) -> DutyEcho {
    DutyEcho {
        loading: if let Shape::Falling = shape {
            "force"
        } else {
            "deflection"
        }
        .into(),
        installed_deflection_m: 0.012,
        working_deflection_m: WORKING,
        working_force_n: if let Shape::Falling = shape {
            Some(326.0)
        } else {
            None
        },
        working_tolerance_m: TOLERANCE,
        overtravel_m: 0.003,
        required_margin: 0.15,
        bow_limit_m: 0.0028,
        rate_loss_share: 0.05,
        allowable_stress_pa: None,
    }
}

fn limits(shape: Shape, path: &Path) -> Vec<Limit> {
    let on_path = |kind: LimitKind| {
        path.marks
            .iter()
            .find(|mark| mark.name == kind.key())
            .map(|mark| (mark.point.deflection_m, mark.point.force_n))
    };
    let critical = 0.0468;
    let mut limits = vec![
        limit(
            LimitKind::Critical,
            Some((critical, RATE * critical)),
            "dead end coils taken as rigid",
        ),
        limit(LimitKind::Solid, Some((SOLID, RATE * SOLID)), ""),
    ];
    for kind in [
        LimitKind::Bow,
        LimitKind::RateLost,
        LimitKind::Clash,
        LimitKind::Stress,
    ] {
        limits.push(limit(kind, on_path(kind), ""));
    }
    if let Shape::Falling = shape {
        limits.push(limit(
            LimitKind::DeadLoadLost,
            on_path(LimitKind::DeadLoadLost),
            "",
        ));
    }
    limits.sort_by(|a, b| {
        let at = |limit: &Limit| limit.deflection_m.unwrap_or(f64::INFINITY);
        at(a).total_cmp(&at(b))
    });
    limits[0].governs = true;
    limits
}

/// An assessment with such a path.
pub fn assessment(shape: Shape) -> Assessment {
    let path = path(shape);
    let limits = limits(shape, &path);
    let governing = limits.iter().find(|l| l.governs).map(|l| l.name);
    let first = path
        .marks
        .iter()
        .find(|mark| mark.name == "rate_lost")
        .map(|mark| mark.point);
    let straight = Measure {
        ..measure(CRITICAL, RATE * CRITICAL)
    };
    let low = measure(0.0473, RATE * 0.0473);
    Assessment {
        title: "Track brake of the funicular, return spring".into(),
        file: "cases/track-brake.toml".into(),
        verdict: if let Shape::Straight = shape {
            Verdict::Holds
        } else {
            Verdict::DoesNotHold
        },
        governing,
        sentence: "An invented answer.".into(),
        undecided_reason: None,
        spring: spring(),
        supports: SupportsEcho {
            bottom: support("clamped"),
            top: support("hinged"),
        },
        guides: vec![],
        imperfections: ImperfectionEcho {
            squareness_m: 0.002,
            parallelism_m: 0.0,
            bow_m: 0.0005,
            bow_shape: "half-sine".into(),
            eccentricity_m: 0.0,
            top_position: "piloted".into(),
        },
        duty: duty(shape),
        defaulted: vec![
            "spring.hand".into(),
            "imperfections.bow_shape".into(),
            "duty.bow_limit".into(),
            "duty.rate_loss_share".into(),
            "material.invented_key".into(),
        ],
        planes: vec![],
        effective_end_constant: EffectiveEndConstant {
            end_constant: Some(0.7031),
            end_constant_error: Some(2.1e-11),
            end_constant_below: None,
            beyond_peak: false,
            handbook_ends: Some("clamped-hinged".into()),
            handbook_constants: vec![0.7, 0.707],
            is_handbook_case: true,
            relative_difference: Some(-0.0183),
            sentence: "An invented constant.".into(),
        },
        closed_form: ClosedForm {
            end_constant: Some(0.7),
            critical_deflection_m: Some(0.0491),
            curves: vec![
                ClosedFormCurve {
                    end_constant: 0.7,
                    source: "EN 13906-1, buckling clause (from memory)".into(),
                    critical_deflection_m: Some(0.0491),
                    critical: Some(measure(0.0491, RATE * 0.0491)),
                    beyond_solid: false,
                    absolute_stability_below_m: Some(0.1032),
                },
                ClosedFormCurve {
                    end_constant: 0.707,
                    source: "Shigley's Mechanical Engineering Design, table of end constants"
                        .into(),
                    critical_deflection_m: Some(low.deflection_m),
                    critical: Some(low),
                    beyond_solid: false,
                    absolute_stability_below_m: Some(0.1022),
                },
            ],
            note: "ξ = C1 (1 − √(1 − C2/λ²)), EN 13906-1 and Shigley.".into(),
            unseen: vec![],
        },
        straight_column: StraightColumn {
            critical_deflection_m: Some(CRITICAL),
            critical_force_n: Some(RATE * CRITICAL),
            error_m: Some(1.4e-12),
            critical: Some(Computed {
                measure: straight,
                error_m: 1.4e-12,
            }),
            beyond_solid: false,
            straightens_again_at_m: None,
        },
        imperfect_column: Some(ImperfectColumn {
            first_limit: first.map(|p| Computed {
                measure: measure(p.deflection_m, p.force_n),
                error_m: 4.8e-10,
            }),
            first_limit_name: first.map(|_| LimitKind::RateLost),
            bow_at_working_m: Some(0.00175),
            bow_at_working_error_m: Some(6.1e-11),
            stress_at_working_pa: Some(6.12e8),
            worst_orientation: None,
            orientations_tried: 1,
            southwell: Some(Southwell {
                deflection_m: 0.04815,
                r_squared: 0.999_987,
                points: 24,
            }),
            branch: path.branch.clone(),
            elements: 32,
            path,
        }),
        comparisons: vec![
            Comparison {
                end_constant: 0.7,
                relative_difference: Some(0.0491 / CRITICAL - 1.0),
                side: Side::Unsafe,
                sentence: "An invented finding.".into(),
            },
            Comparison {
                end_constant: 0.707,
                relative_difference: Some(0.0473 / CRITICAL - 1.0),
                side: Side::Safe,
                sentence: "An invented finding.".into(),
            },
        ],
        limits,
        dead_load: if let Shape::Falling = shape {
            Some(DeadLoad {
                path_ends_at_m: None,
                rests_solid: true,
                clash_on_the_way: true,
                lost_at_force_n: Some(381.2),
                lost_at_deflection_m: Some(0.04612),
                rests_at_deflection_m: Some(SOLID),
                jump_m: Some(SOLID - 0.04612),
                energy_freed_j: Some(4.871),
            })
        } else {
            None
        },
        snap: None,
        guide_answer: None,
        seat_loads: None,
        stroke: None,
        absolute_stability: AbsoluteStability {
            formula: Some(false),
            formula_below_m: Some(0.1032),
            column: false,
            column_below_m: Some(0.0754),
            column_below_error_m: Some(3.0e-9),
            sentence: "An invented bound.".into(),
        },
        support_sensitivity: None,
        stress_at_solid: StressAtSolid {
            stress_pa: 1.21e9,
            allowable_pa: None,
            within: None,
        },
        failures: vec![],
        warnings: vec![
            "The closed form is on the unsafe side of the column for the end constant 0.7.".into(),
        ],
    }
}

/// The same spring in every kind of support and guide there is, its two planes unlike.
pub fn in_every_support() -> Assessment {
    let mut all = assessment(Shape::Rising);
    all.supports.bottom = SupportEcho {
        kind: "flat".into(),
        rotational_stiffness_n_m_per_rad: None,
        contact: "flat".into(),
        seat_radius_m: Some(0.014),
        seat_edge_m: Some(0.014),
        ground_share: Some(0.75),
        friction: Some(0.15),
        axial_stiffness_n_per_m: Some(9e4),
        axial_law: Some(vec![
            ForceLawPoint {
                motion_m: 0.0,
                force_n: 0.0,
            },
            ForceLawPoint {
                motion_m: 0.001,
                force_n: 90.0,
            },
            ForceLawPoint {
                motion_m: 0.002,
                force_n: 400.0,
            },
        ]),
        ..support("clamped")
    };
    all.supports.top = SupportEcho {
        kind: "ball".into(),
        contact: "ball".into(),
        friction: Some(0.1),
        swivel_radius_m: Some(0.006),
        rotational_stiffness_n_m_per_rad: Some(3.5),
        rotational_law: Some(vec![
            MomentLawPoint {
                rotation_rad: 0.0,
                moment_n_m: 0.0,
            },
            MomentLawPoint {
                rotation_rad: 0.1,
                moment_n_m: 0.35,
            },
        ]),
        link: Some(LinkEcho {
            kind: "strut".into(),
            length_m: 0.04,
        }),
        motion: Some(MotionEcho {
            kind: "lever".into(),
            pivot_along_m: Some(0.01),
            pivot_across_m: Some(-0.12),
            table: vec![],
        }),
        other_plane: Some(LateralEcho {
            rotational_stiffness_n_m_per_rad: Some(0.0),
            sideways_stiffness_n_per_m: Some(12e3),
            rotational_law: None,
            sideways_law: None,
            tilt_rad: 0.01,
            offset_m: 0.001,
        }),
        plane_rad: 0.5235987755982988,
        ..support("hinged")
    };
    all.guides = vec![
        GuideEcho {
            kind: "rod".into(),
            diameter_m: 0.022,
            clearance_free_m: 0.001,
            clearance_closed_m: 0.0012,
            fixed_to: "bottom".into(),
            from_m: 0.0,
            to_m: Some(0.05),
            friction: 0.12,
            touching_allowed: true,
        },
        GuideEcho {
            kind: "bore".into(),
            diameter_m: 0.036,
            clearance_free_m: 0.002,
            clearance_closed_m: 0.0018,
            fixed_to: "ground".into(),
            from_m: 0.0,
            to_m: None,
            friction: 0.0,
            touching_allowed: false,
        },
    ];
    all.closed_form.unseen = vec!["An invented blind spot.".into()];
    let plane = |direction_rad: f64, governs: bool, at: f64| PlaneAnswer {
        direction_rad,
        governs,
        verdict: if governs {
            Verdict::DoesNotHold
        } else {
            Verdict::Holds
        },
        undecided_reason: None,
        governing: Some(LimitKind::Bow),
        deflection_m: Some(at),
        force_n: Some(RATE * at),
        margin: Some(measure(at, 0.0).margin),
        required_margin: Some(0.15),
        critical_deflection_m: governs.then_some(CRITICAL),
    };
    all.planes = vec![
        plane(0.5235987755982988, false, 0.051),
        plane(2.0943951023931953, true, 0.043),
    ];
    let property = |property: &str, larger: Option<f64>, smaller: Option<f64>| {
        let critical = |change: Option<f64>| change.map(|change| CRITICAL * (1.0 + change));
        SupportSensitivity {
            end: "top".into(),
            property: property.into(),
            critical_if_larger_m: critical(larger),
            critical_if_smaller_m: critical(smaller),
            relative_change_if_larger: larger,
            relative_change_if_smaller: smaller,
            relative_change_error: Some(3e-11),
        }
    };
    all.support_sensitivity = Some(Sensitivities {
        properties: vec![
            property("sideways_stiffness", None, Some(-0.0312)),
            property("rotational_stiffness", Some(0.00412), Some(-0.0047)),
        ],
        sentence: "An invented advice.".into(),
    });
    bear(&mut all);
    all
}

/// What guides and seats bear, and a stroke with friction: made up.
fn bear(all: &mut Assessment) {
    const TOUCH: f64 = 0.031;
    let leaning_hard = |point: &mut PathPoint| {
        let over = (point.deflection_m - TOUCH).max(0.0);
        point.guide_room_m = Some(if over > 0.0 { 0.0 } else { 0.001 - point.bow_m });
        point.guide_force_n = 900.0 * over;
        point.guide_coil_force_n = 600.0 * over;
        point.guide_coil_place = 0.31;
        point.guide_places = 2 * u32::from(over > 0.0);
        point.guide_longest_m = 2.0 * over;
        point.guide_corner_force_n = 150.0 * over;
        point.guide_friction_n = 0.12 * 900.0 * over;
    };
    let column = all.imperfect_column.as_mut().expect("a path");
    let path = &mut column.path;
    path.points.iter_mut().for_each(leaning_hard);
    for mark in &mut path.marks {
        leaning_hard(&mut mark.point);
    }
    for (name, q) in [
        ("first_touch", 0.0006),
        ("line_contact", 0.0014),
        ("second_place", 0.0011),
        ("lift_off", 0.003),
        ("slide", 0.0045),
        ("guide_touch", 0.0009),
        ("loose_flat", 0.0052),
        ("seated", 0.00004),
    ] {
        let mut point = bowed(Shape::Rising, q);
        leaning_hard(&mut point);
        path.marks.push(mark(name, point));
    }
    path.marks
        .sort_by(|a, b| a.point.bow_m.total_cmp(&b.point.bow_m));
    let path = path.clone();
    let of = |name: &str| {
        let mark = path.marks.iter().find(|mark| mark.name == name);
        mark.expect("a mark").point
    };
    for kind in [LimitKind::LiftOff, LimitKind::Slide, LimitKind::GuideTouch] {
        let at = of(kind.key());
        let reached = Some((at.deflection_m, at.force_n));
        all.limits.push(limit(kind, reached, "an invented note"));
    }
    all.limits.push(limit(
        LimitKind::BoreFilled,
        Some((0.0995, RATE * 0.0995)),
        "an invented note",
    ));
    let at = |limit: &Limit| limit.deflection_m.unwrap_or(f64::INFINITY);
    all.limits.sort_by(|a, b| at(a).total_cmp(&at(b)));

    let pad = |from: f64, to: f64, side: f64, force_n: f64| Leaning {
        from_m: from,
        to_m: to,
        side,
        force_n_per_m: force_n / (to - from),
        at_corner: false,
    };
    let working = of("working");
    all.guide_answer = Some(GuideAnswer {
        first_touch_m: Some(of("first_touch").deflection_m),
        first_touch_place: Some(0.31),
        line_contact_m: Some(of("line_contact").deflection_m),
        second_place_m: Some(of("second_place").deflection_m),
        loose_flat_m: Some(of("loose_flat").deflection_m),
        at_working: working,
        leaning: vec![
            pad(0.0360, 0.0385, 1.0, 1.1),
            pad(0.0385, 0.0410, 1.0, 2.4),
            pad(0.0410, 0.0435, 1.0, 1.3),
            Leaning {
                at_corner: true,
                ..pad(0.0498, 0.0500, -1.0, 0.9)
            },
            pad(0.0925, 0.0950, -1.0, 1.7),
        ],
        largest_coil_force_n: working.guide_coil_force_n,
        deepest_m: 2.4e-9,
        without_first_limit: Some(LimitKind::RateLost),
        without_first_limit_m: Some(0.0331),
        sentence: "An invented help.".into(),
    });
    let seat = |sign: f64| SeatLoad {
        largest_thrust_n: sign * 6.52,
        at_deflection_m: WORKING + TOLERANCE,
        farthest_line_m: Some(sign * 0.0007),
        line_at_working_m: Some(sign * 0.00065),
    };
    all.seat_loads = Some([
        seat(1.0),
        SeatLoad {
            farthest_line_m: None,
            line_at_working_m: None,
            ..seat(-1.0)
        },
    ]);
    // A parallelogram: out above, back below.
    let leg = |shift: f64| -> Vec<PathPoint> {
        let between = |share: f64| 0.012 + share * (WORKING + TOLERANCE - 0.012);
        (0..=20)
            .map(|i| between(f64::from(i) / 20.0))
            .map(|deflection| point(deflection, RATE * deflection + shift, 0.001))
            .collect()
    };
    let mut back = leg(-5.0);
    back.reverse();
    all.stroke = Some(Stroke {
        from_deflection_m: 0.012,
        to_deflection_m: WORKING + TOLERANCE,
        energy_lost_j: 0.285,
        friction_work_j: 0.2851,
        closes_within: 3e-7,
        out: leg(5.0),
        back,
    });
}
