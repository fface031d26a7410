//! A path of a spring in its seats under way.

use coilstay::column::{Column, ColumnState, Deviations, Idealisation, SeatPress};
use coilstay::setup::{Orientation, Setup};
use coilstay::solve::{Newton, Outcome, PathPoint, PathSettings, follow, locate, start, turn_back};

pub type Point = PathPoint<3, 5>;

/// The path, with what turns its numbers into those of L = 1 and k = 1.
pub struct Walk {
    pub column: Column,
    /// Points followed since the last turn.
    pub points: Vec<Point>,
    /// Forces in kL for one of the column's units.
    pub force: f64,
    /// Height of the top seat at no travel.
    start: f64,
}

impl Walk {
    /// At rest without load.
    pub fn new(setup: &Setup, elements: usize) -> Self {
        let deviations = Deviations {
            sizes: &setup.imperfections,
            orientation: Orientation::plain(),
            mode: None,
        };
        let mut column =
            Column::of_setup(setup, Idealisation::AsBuilt, elements, Some(&deviations));
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let first = start(&mut column, &mut newton, &guess, 0.0).expect("starts");
        let length = setup.spring.deformable_length();
        let arms = setup.spring.dead_height() + setup.bottom.arm + setup.top.arm;
        Walk {
            force: column.scale.force / (setup.spring.rate() * length),
            start: 1.0 + arms / length,
            column,
            points: vec![first],
        }
    }

    /// The path up to a travel, whatever way it takes there.
    pub fn to(setup: &Setup, elements: usize, travel: f64) -> Self {
        let mut walk = Walk::new(setup, elements);
        walk.go_on(travel, PathSettings::default().largest_step);
        walk
    }

    /// How far the top seat is from where it stands on the straight, unloaded column.
    pub fn travel(&self, point: &Point) -> f64 {
        self.start - point.state.nodes[self.column.elements()][0]
    }

    /// Load in kL.
    pub fn load(&self, point: &Point) -> f64 {
        point.load * self.force
    }

    /// Rotation of the end sections, rad.
    pub fn turns(&self, state: &ColumnState) -> [f64; 2] {
        [0, self.column.elements()].map(|node| state.nodes[node][2])
    }

    /// How both ends press on their seats.
    pub fn presses(&self, state: &ColumnState) -> [SeatPress; 2] {
        [0, 1].map(|end| self.column.seat_press(state, end))
    }

    /// Moment in kL² that the column passes at both its ends.
    pub fn moments(&self, state: &ColumnState) -> [f64; 2] {
        let [bottom, top] = self.column.end_actions(state);
        [-bottom[2] * self.force, top[2] * self.force]
    }

    /// Sideways force that it passes, in kL.
    pub fn side_force(&self, state: &ColumnState) -> f64 {
        state.inner[0][4] * self.force
    }

    pub fn last(&self) -> &Point {
        &self.points[self.points.len() - 1]
    }

    /// Follows on until `stop`.
    pub fn until(&mut self, largest_step: f64, stop: impl Fn(&Walk, &Point) -> bool) {
        let settings = PathSettings {
            largest_step,
            first_step: largest_step.min(0.01),
            most_points: 20_000,
            ..PathSettings::default()
        };
        let mut points = std::mem::take(&mut self.points);
        let mut column = self.column.clone();
        let (outcome, _) = follow(
            &mut column,
            &mut Newton::new(&self.column),
            &mut points,
            &settings,
            |points| stop(self, &points[points.len() - 1]),
        );
        self.points = points;
        self.column = column;
        assert_eq!(outcome, Outcome::Stopped, "{:?}", self.last().load);
    }

    /// Follows on to exactly that travel.
    pub fn go_on(&mut self, travel: f64, largest_step: f64) {
        let sense = (travel - self.travel(self.last())).signum();
        let beyond = |walk: &Walk, point: &Point| sense * (walk.travel(point) - travel) >= 0.0;
        self.until(largest_step, beyond);
        let after = self.points.len() - 2;
        let end = self.located(after, |walk, point| travel - walk.travel(point));
        self.points.pop();
        self.points[after].distance = end.1;
        self.points.push(end.0);
    }

    /// Turns round.
    pub fn turn(&mut self) {
        let last = self.points[self.points.len() - 1].clone();
        let mut newton = Newton::new(&self.column);
        self.points = vec![turn_back(&mut self.column, &mut newton, &last)];
    }

    /// The point at a travel, where the path first comes to it.
    pub fn at(&self, travel: f64) -> Point {
        let after = self
            .points
            .windows(2)
            .position(|pair| {
                let [from, to] = [0, 1].map(|i| self.travel(&pair[i]) - travel);
                from * to <= 0.0 && from != 0.0
            })
            .expect("on the way");
        self.located(after, |walk, point| travel - walk.travel(point))
            .0
    }

    fn located(&self, after: usize, function: impl Fn(&Walk, &Point) -> f64) -> (Point, f64) {
        let mut column = self.column.clone();
        let found = locate(
            &mut column,
            &mut Newton::new(&self.column),
            &self.points,
            after,
            1e-14,
            |point| function(self, point),
        )
        .expect("there");
        (found.point, found.distance)
    }

    /// ∫ P ds along the points, kL², by trapezoids with the slopes at their ends (an error of the
    /// fifth order of each step).
    pub fn work(&self) -> f64 {
        let last = self.column.elements();
        let slope =
            |point: &Point| -point.load_direction * self.force / point.direction.nodes[last][0];
        self.points
            .windows(2)
            .map(|pair| {
                let way = self.travel(&pair[1]) - self.travel(&pair[0]);
                0.5 * way * (self.load(&pair[0]) + self.load(&pair[1]))
                    + way * way / 12.0 * (slope(&pair[0]) - slope(&pair[1]))
            })
            .sum()
    }

    /// Energy stored, kL².
    pub fn energy(&self, point: &Point) -> f64 {
        self.column.strain_energy(&point.state) * self.force
    }
}

/// Asserts that each named pair of numbers is the same to `close`.
pub fn assert_same(at: &str, close: f64, pairs: &[(&str, f64, f64)]) {
    for (what, mine, its) in pairs {
        assert!(
            (mine - its).abs() < close,
            "{what} at {at}: {mine} {its}, {:e}",
            mine - its
        );
    }
}
