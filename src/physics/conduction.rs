//! Heat conduction through a lining: a one-dimensional grid graded to the
//! materials, and the rates of change of its temperatures.
//!
//! Vertex-centred finite volumes: a node on each face and on every boundary
//! between materials, so that the face temperatures are unknowns, a steady
//! profile is exact and the grid's own energy closes.
//!
//! The grid is laid out in diffusion time: a stretch dx of material counts as
//! `dx/sqrt(alpha)`. The cell at a heated face is `2.2 sqrt(alpha x 1 s)` (the
//! fastest mode then decays at about 0.6 1/s and does not limit an explicit
//! step), and cells grow by at most 1.3 from there; both were measured on the
//! numerical prototype.

/// One course of a lining.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Course {
    /// Thickness, m.
    pub thickness: f64,
    /// Thermal conductivity, W/m/K.
    pub conductivity: f64,
    /// Density, kg/m3.
    pub density: f64,
    /// Heat capacity, J/kg/K.
    pub heat_capacity: f64,
}

impl Course {
    /// Thermal diffusivity, m2/s.
    #[must_use]
    pub fn diffusivity(&self) -> f64 {
        self.conductivity / (self.density * self.heat_capacity)
    }

    fn resistance(&self) -> f64 {
        self.thickness / self.conductivity
    }

    fn capacity(&self) -> f64 {
        self.thickness * self.density * self.heat_capacity
    }

    /// Thickness in diffusion time, s^(1/2).
    fn span(&self) -> f64 {
        self.thickness / self.diffusivity().sqrt()
    }

    fn is_usable(&self) -> bool {
        [
            self.thickness,
            self.conductivity,
            self.density,
            self.heat_capacity,
        ]
        .iter()
        .all(|x| x.is_finite() && *x > 0.0)
    }

    fn part(&self, share: f64) -> Self {
        Self {
            thickness: self.thickness * share,
            ..*self
        }
    }
}

/// First cell at a heated face in diffusion time, s^(1/2).
const FIRST_SPAN: f64 = 2.2;

/// Largest ratio of neighbouring cells.
const GROWTH: f64 = 1.3;

/// Share of a cell's heat that its node nearer to the heated face takes. Even
/// halves would count too much heat in the convex profile of a wall that warms
/// up and leave the face 1 to 4 % too cool; for a profile that decays by
/// `exp(-s)` over a cell the right share is `1/2 - s/12`, and cells that grow by
/// 1.3 see `s` of about 0.7 (face temperature then within 0.7 % from 10 s on).
const NEAR_SHARE: f64 = 0.44;

/// Courses thinner than this in diffusion time, s^(1/2), get no cell of their
/// own: their heat sits on a node and their resistance in its neighbours, for
/// a cell that thin would limit the step.
const THINNEST_SPAN: f64 = 1.1;

/// Heat transfer coefficient at which a lining is judged thermally thin,
/// W/m2/K, and the Biot number below which it gets a single node.
const THIN_COEFFICIENT: f64 = 30.0;
const THIN_BIOT: f64 = 0.1;

/// Nodes of a lining from the front (hot) face to the back.
#[derive(Debug, Clone, PartialEq)]
pub struct Grid {
    /// Heat capacity of each node's cell, J/m2/K.
    pub capacity: Vec<f64>,
    /// Conductance between neighbouring nodes, W/m2/K; one fewer than nodes.
    pub conductance: Vec<f64>,
    /// Depth of each node below the front face, m.
    pub depth: Vec<f64>,
}

impl Grid {
    /// Number of nodes, at least one.
    #[must_use]
    pub fn nodes(&self) -> usize {
        self.capacity.len()
    }

    /// Heat in the lining above 0 K at the given node temperatures, J/m2.
    #[must_use]
    pub fn heat(&self, temperature: &[f64]) -> f64 {
        let pairs = self.capacity.iter().zip(temperature);
        pairs.map(|(c, t)| c * t).sum()
    }

    /// Heat flux through the lining in a steady state between two face
    /// temperatures, W/m2 per K: the conductances in series. Infinite for a
    /// single node.
    #[must_use]
    pub fn transmittance(&self) -> f64 {
        let resistance: f64 = self.conductance.iter().map(|k| 1.0 / k).sum();
        if resistance > 0.0 {
            1.0 / resistance
        } else {
            f64::INFINITY
        }
    }
}

/// Lays out the grid of a lining whose courses run from the front (hot) face
/// inwards.
///
/// `two_sided` grades the cells from both faces, for a wall that two rooms
/// heat; otherwise from the front face only. A lining whose Biot number
/// `30 W/m2K x resistance` is below 0.1 gets one node. Courses with a
/// thickness or property that is not a positive number are left out; `None`
/// where nothing remains.
#[must_use]
pub fn grid(courses: &[Course], two_sided: bool) -> Option<Grid> {
    let courses: Vec<Course> = courses.iter().copied().filter(Course::is_usable).collect();
    if courses.is_empty() {
        return None;
    }
    let resistance: f64 = courses.iter().map(Course::resistance).sum();
    if THIN_COEFFICIENT * resistance < THIN_BIOT {
        return Some(Grid {
            capacity: vec![courses.iter().map(Course::capacity).sum()],
            conductance: Vec::new(),
            depth: vec![0.0],
        });
    }
    let cells = if two_sided {
        let (front, mut back) = halves(&courses);
        back.reverse();
        let mut cells = graded(&front);
        cells.extend(graded(&back).into_iter().rev().map(Cell::turned));
        cells
    } else {
        graded(&courses)
    };
    Some(assemble(&cells))
}

/// Cuts the courses at half of the total diffusion time.
fn halves(courses: &[Course]) -> (Vec<Course>, Vec<Course>) {
    let middle = 0.5 * courses.iter().map(Course::span).sum::<f64>();
    let (mut front, mut back) = (Vec::new(), Vec::new());
    let mut passed = 0.0;
    for course in courses {
        let span = course.span();
        let share = ((middle - passed) / span).clamp(0.0, 1.0);
        // Slivers on either side of the cut would only be merged again.
        let share = if share * span < THINNEST_SPAN {
            0.0
        } else if (1.0 - share) * span < THINNEST_SPAN {
            1.0
        } else {
            share
        };
        if share > 0.0 {
            front.push(course.part(share));
        }
        if share < 1.0 {
            back.push(course.part(1.0 - share));
        }
        passed += span;
    }
    (front, back)
}

/// A stretch of material between two nodes, or (`thin`) a course too thin for
/// nodes of its own.
#[derive(Debug, Clone, Copy)]
struct Cell {
    course: Course,
    thin: bool,
    /// Share of the heat that belongs to the node in front.
    front_share: f64,
}

impl Cell {
    fn new(course: Course, thin: bool) -> Self {
        Self {
            course,
            thin,
            front_share: NEAR_SHARE,
        }
    }

    fn turned(self) -> Self {
        Self {
            front_share: 1.0 - self.front_share,
            ..self
        }
    }
}

/// Cells of the courses, growing from the first one's outer face.
fn graded(courses: &[Course]) -> Vec<Cell> {
    let mut cells = Vec::new();
    let mut next = FIRST_SPAN;
    for course in courses {
        let span = course.span();
        if span < THINNEST_SPAN {
            cells.push(Cell::new(*course, true));
            continue;
        }
        let parts = shares(span / next);
        let last = parts.last().copied().unwrap_or(1.0) * span;
        let parts = parts.into_iter().map(|share| course.part(share));
        cells.extend(parts.map(|part| Cell::new(part, false)));
        next = (last * GROWTH).max(FIRST_SPAN);
    }
    cells
}

/// Shares of a course's thickness that its cells take, the first cell being
/// `1/ratio` of it where that fits.
fn shares(ratio: f64) -> Vec<f64> {
    let mut count = 1;
    let mut sum = 1.0;
    let mut term = 1.0;
    while sum < ratio && count < 200 {
        term *= GROWTH;
        sum += term;
        count += 1;
    }
    let series = |growth: f64| -> f64 { (0..count).map(|i| growth.powi(i)).sum() };
    // The growth that fills the course exactly; equal cells where even they
    // are more than enough.
    let (mut low, mut high) = (1.0, GROWTH);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if series(middle) < ratio {
            low = middle;
        } else {
            high = middle;
        }
    }
    let growth = 0.5 * (low + high);
    let total = series(growth);
    (0..count).map(|i| growth.powi(i) / total).collect()
}

/// Nodes from cells: a cell's heat goes to the nodes at its ends, that of a thin
/// course to the node it touches.
fn assemble(cells: &[Cell]) -> Grid {
    let only_thin = cells.iter().all(|cell| cell.thin);
    let mut capacity = vec![0.0];
    let mut conductance = Vec::new();
    let mut depth = vec![0.0];
    let mut passed = 0.0;
    let mut waiting = 0.0;
    for cell in cells {
        let course = &cell.course;
        let last = capacity.len() - 1;
        passed += course.thickness;
        if cell.thin && !only_thin {
            capacity[last] += course.capacity();
            if conductance.is_empty() {
                // On the front face: all of the resistance lies inside.
                waiting += course.resistance();
            } else {
                let share = 0.5 * course.resistance();
                conductance[last - 1] = 1.0 / (1.0 / conductance[last - 1] + share);
                waiting += share;
            }
            continue;
        }
        capacity[last] += cell.front_share * course.capacity();
        capacity.push((1.0 - cell.front_share) * course.capacity());
        conductance.push(1.0 / (course.resistance() + waiting));
        depth.push(passed);
        waiting = 0.0;
    }
    if waiting > 0.0 {
        // On the back face: the rest of the resistance lies inside too.
        if let Some(k) = conductance.last_mut() {
            *k = 1.0 / (1.0 / *k + waiting);
        }
    }
    Grid {
        capacity,
        conductance,
        depth,
    }
}

/// Rates of change of the node temperatures, K/s:
/// `C dT/dt = K (T_before - T) + K (T_after - T)`, with the fluxes into the
/// solid at both faces, W/m2, `flux_front` at the first node and `flux_back`
/// at the last.
///
/// `temperature` and `out` hold [`Grid::nodes`] values in K and K/s; further
/// places are left alone, missing ones end the work early.
pub fn rates(grid: &Grid, temperature: &[f64], flux_front: f64, flux_back: f64, out: &mut [f64]) {
    let nodes = grid.nodes().min(temperature.len()).min(out.len());
    let mut arriving = flux_front;
    for i in 0..nodes {
        let leaving = if i + 1 < nodes {
            grid.conductance[i] * (temperature[i] - temperature[i + 1])
        } else {
            -flux_back
        };
        out[i] = (arriving - leaving) / grid.capacity[i];
        arriving = leaving;
    }
}
