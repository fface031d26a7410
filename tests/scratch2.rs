use coilstay::column::*;
use coilstay::solve::*;
use coilstay::spring::Section;
use std::f64::consts::PI;
#[test]
fn look() {
    for (slenderness, clamped, bow, clearance) in [
        (10.0_f64, [true, false], 0.002, 0.01),
        (12.0, [true, true], 0.003, 0.015),
    ] {
        let r = 206.0 / 81.5;
        let axial = 2.0 * (2.0 + r) / r * slenderness * slenderness;
        let elements = 64;
        let section = Section {
            axial,
            shear: r * axial,
            bending: 1.0,
        };
        let shape = NaturalShape {
            angle: &|s| bow * PI * (PI * s).cos(),
            curvature: &|s| -bow * PI * PI * (PI * s).sin(),
        };
        let t = |c: bool| if c { Hold::Held(0.0) } else { Hold::Free };
        let mut column = Column::new(1.0, elements, &|_| section, &shape)
            .held(
                EndLaws([Hold::Held(0.0), Hold::Held(0.0), t(clamped[0])]),
                EndLaws([Hold::Free, Hold::Held(0.0), t(clamped[1])]),
            )
            .with_guides(vec![Wall::plain(clearance)])
            .with_load_scale(20.0);
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let first = start(&mut column, &mut newton, &guess, 0.0).expect("starts");
        let mut points = vec![first];
        let out = follow(
            &mut column,
            &mut newton,
            &mut points,
            &PathSettings::default(),
            |p| p[p.len() - 1].state.nodes[64][0] < 0.5,
        );
        println!("{out:?}");
        let mut contacts = Vec::new();
        for p in points
            .iter()
            .rev()
            .take(4)
            .collect::<Vec<_>>()
            .into_iter()
            .rev()
        {
            column.contacts(&p.state, &mut contacts);
            println!(
                "x {} P {} dP {} neg {}",
                p.state.nodes[64][0], p.load, p.load_direction, p.negatives
            );
            for c in &contacts {
                print!("{:.4}:{:.1e} ", c.place, c.side * c.push);
            }
            println!();
        }
    }
}
