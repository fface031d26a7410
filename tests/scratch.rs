mod fixture;
use coilstay::assess::assess;
use coilstay::setup::*;
#[test]
fn look() {
    let mut case = fixture::setup(6.0, 2.6, Support::clamped(), Support::clamped());
    case.bottom = Support::clamped();
    case.top = Support::hinged();
    case.imperfections.squareness = 0.002;
    println!("{:?}", case.spring);
    println!("{:?}", case.duty);
    case.duty.working_deflection = 0.3 * case.spring.free_length;
    case.duty.installed_deflection = 0.1 * case.spring.free_length;
    case.guides.push(Guide {
        kind: GuideKind::Rod,
        diameter: case.spring.inner_diameter() - 0.004,
        fixed_to: FixedTo::Bottom,
        from: 0.0,
        to: f64::INFINITY,
        friction: 0.15,
        touching_allowed: true,
    });
    for to in [f64::INFINITY, 0.15] {
        case.guides[0].to = to;
        let a = assess(&case, "x");
        println!("{:?} {:?}", a.verdict, a.failures);
        for l in &a.limits {
            println!("{:?} {:?} {:?}", l.name, l.deflection_m, l.error_m);
        }
        println!(
            "{:#?}",
            a.guide_answer.as_ref().map(|g| (
                &g.sentence,
                g.first_touch_m,
                g.line_contact_m,
                g.second_place_m,
                g.loose_flat_m,
                g.deepest_m,
                g.at_working,
                g.largest_coil_force_n
            ))
        );
        println!("{:#?}", a.seat_loads);
        println!(
            "{:?}",
            a.stroke.as_ref().map(|s| (
                s.energy_lost_j,
                s.friction_work_j,
                s.closes_within,
                s.out.len(),
                s.back.len()
            ))
        );
    }
}
