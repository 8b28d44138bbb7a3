//! The brute-force sampler: pools and pour-over on a [`Grid`], by flood fill and by pouring one cell's worth of liquid
//! after the other. Shares nothing with the kernel: no tree, no events, no formula of area.
//!
//! The liquid is a set of cells that are full. The direction turns in small steps. At each step every full cell lets go
//! of its liquid, which runs down to a low point, and the pool there takes it in: it wets the lowest node at its border.
//! Where that node lies lower than the pool already stands, the pool stands at a sill, and the liquid runs down the other
//! side. Where it is wet with another pool that stands no lower, the two join. Where it lies on a mouth, the liquid has left.

use std::cmp::Reverse;
use std::collections::{BinaryHeap, HashMap};

use brimwright::geom::{Point, Vec2};

use super::grid::Grid;

/// One connected body.
#[derive(Clone, Debug)]
pub struct GridPool {
    pub area: f64,
    pub centroid: Point,
    pub deepest: Point,
    /// Level of its highest node.
    pub level: f64,
}

/// Liquid at rest in one direction.
pub struct Standing<'a> {
    grid: &'a Grid,
    up: Vec2,
    pools: Vec<Pool>,
    /// The pool that wets a node.
    owner: Vec<Option<usize>>,
    /// Pools by number, and the one that each has gone into.
    joined_into: Vec<usize>,
    n_left: usize,
    /// All nodes from the lowest to the highest, and the place of each in that order.
    order: Vec<u32>,
    rank: Vec<u32>,
    /// Low point below each node.
    foot: Vec<u32>,
    landing: HashMap<u32, u32>,
}

#[derive(Default)]
struct Pool {
    /// Nodes next to wet ones, the lowest first, by rank.
    border: BinaryHeap<Reverse<u32>>,
    /// Ranks of its lowest and its highest node.
    deepest: Option<u32>,
    stands_at: u32,
    n_cells: usize,
    /// Sum of where its cells are.
    moment: Vec2,
}

/// What becomes of liquid that a pool is given.
enum Given {
    Kept,
    /// It leaves through a mouth.
    Left,
    /// It goes over a sill to this node.
    Over(u32),
}

/// What a way of the direction leaves behind.
pub struct PouredOver<'a> {
    pub end: Standing<'a>,
    /// Area that has left, after each step.
    pub left: Vec<f64>,
}

/// Connected parts of the section below a level, the largest first.
pub fn components(grid: &Grid, up: Vec2, level: f64) -> Vec<GridPool> {
    let height: Vec<f64> = grid.at.iter().map(|p| up.dot(&p.coords)).collect();
    let mut is_seen: Vec<bool> = height.iter().map(|&h| h >= level).collect();
    let mut out = vec![];
    for start in 0..grid.n_cells {
        if is_seen[start] {
            continue;
        }
        is_seen[start] = true;
        let (mut stack, mut deepest, mut n_cells, mut moment) = (vec![start], start, 0.0, Vec2::zeros());
        while let Some(node) = stack.pop() {
            if node < grid.n_cells {
                n_cells += 1.0;
                moment += grid.at[node].coords;
            }
            if height[node] < height[deepest] {
                deepest = node;
            }
            for &next in &grid.links[node] {
                if !std::mem::replace(&mut is_seen[next as usize], true) {
                    stack.push(next as usize);
                }
            }
        }
        let (area, centroid) = (n_cells * grid.cell_area(), Point::from(moment / n_cells));
        out.push(GridPool { area, centroid, deepest: grid.at[deepest], level });
    }
    out.sort_by(|a, b| b.area.total_cmp(&a.area));
    out
}

/// Cells below a common level that together make up `area`.
pub fn filled_at_rest(grid: &Grid, up: Vec2, area: f64) -> Vec<u32> {
    let mut cells: Vec<u32> = (0..grid.n_cells as u32).collect();
    let height = |i: &u32| up.dot(&grid.at[*i as usize].coords);
    cells.sort_by(|a, b| height(a).total_cmp(&height(b)));
    cells.truncate((area / grid.cell_area()).round() as usize);
    cells
}

/// Directions from `from` to `to`, turning the shorter way round in equal steps, without the first.
pub fn turn(from: Vec2, to: Vec2, n_steps: usize) -> Vec<Vec2> {
    let angle = brimwright::geom::cross(from, to).atan2(from.dot(&to));
    let turned = |k: usize| brimwright::geom::rotate(from.normalize(), angle * k as f64 / n_steps as f64);
    (1..=n_steps).map(turned).collect()
}

/// Lets the liquid of the full cells follow the directions, one after the other.
pub fn pour_over<'a>(grid: &'a Grid, full: &[u32], ups: &[Vec2]) -> PouredOver<'a> {
    let mut end = Standing::settle(grid, ups[0], full);
    let mut left = vec![end.left()];
    for &up in &ups[1..] {
        let n_left_before = end.n_left;
        end = Standing::settle(grid, up, &end.full());
        end.n_left += n_left_before;
        left.push(end.left());
    }
    PouredOver { end, left }
}

impl<'a> Standing<'a> {
    /// Lets go of the liquid of the full cells.
    fn settle(grid: &'a Grid, up: Vec2, full: &[u32]) -> Standing<'a> {
        let height: Vec<f64> = grid.at.iter().map(|p| up.dot(&p.coords)).collect();
        let mut order: Vec<u32> = (0..grid.at.len() as u32).collect();
        order.sort_unstable_by(|&a, &b| height[a as usize].total_cmp(&height[b as usize]).then(a.cmp(&b)));
        let mut rank = vec![0; order.len()];
        for (place, &node) in order.iter().enumerate() {
            rank[node as usize] = place as u32;
        }
        let mut foot: Vec<u32> = (0..grid.at.len() as u32).collect();
        for &node in &order {
            let lowest = grid.links[node as usize].iter().min_by_key(|&&n| rank[n as usize]);
            if let Some(&lowest) = lowest.filter(|&&n| rank[n as usize] < rank[node as usize]) {
                foot[node as usize] = foot[lowest as usize];
            }
        }
        let owner = vec![None; order.len()];
        let mut this = Standing {
            grid,
            up,
            pools: vec![],
            owner,
            joined_into: vec![],
            n_left: 0,
            order,
            rank,
            foot,
            landing: HashMap::new(),
        };
        for &cell in full {
            this.pour(this.foot[cell as usize]);
        }
        this
    }

    /// Area that has left through mouths.
    pub fn left(&self) -> f64 {
        self.n_left as f64 * self.grid.cell_area()
    }

    /// All pools, the largest first.
    pub fn pools(&self) -> Vec<GridPool> {
        let is_body = |&i: &usize| self.root(i) == i && self.pools[i].n_cells > 0;
        let mut out: Vec<GridPool> = (0..self.pools.len()).filter(is_body).map(|i| self.shown(i)).collect();
        out.sort_by(|a, b| b.area.total_cmp(&a.area));
        out
    }

    /// The pool at a place; none where it is dry.
    pub fn pool_at(&self, place: Point) -> Option<GridPool> {
        self.owner[self.grid.node_near(place)].map(|pool| self.shown(self.root(pool)))
    }

    fn shown(&self, pool: usize) -> GridPool {
        let (grid, pool) = (self.grid, &self.pools[pool]);
        let at = |rank: u32| grid.at[self.order[rank as usize] as usize];
        GridPool {
            area: pool.n_cells as f64 * grid.cell_area(),
            centroid: Point::from(pool.moment / pool.n_cells as f64),
            deepest: at(pool.deepest.expect("a pool has a node")),
            level: self.up.dot(&at(pool.stands_at).coords),
        }
    }

    fn full(&self) -> Vec<u32> {
        (0..self.grid.n_cells as u32).filter(|&i| self.owner[i as usize].is_some()).collect()
    }

    fn root(&self, mut pool: usize) -> usize {
        while self.joined_into[pool] != pool {
            pool = self.joined_into[pool];
        }
        pool
    }

    /// One cell's worth of liquid comes to a low point.
    fn pour(&mut self, mut low: u32) {
        for _ in 0..self.order.len() {
            let pool = self.pool_of(low);
            match self.give(pool) {
                Given::Kept => return,
                Given::Left => {
                    self.n_left += 1;
                    return;
                }
                Given::Over(node) => low = self.lands(node),
            }
        }
        panic!("liquid runs in a ring near {}", self.grid.at[low as usize]);
    }

    /// The pool that wets a low point, or a new one that is about to.
    fn pool_of(&mut self, low: u32) -> usize {
        if let Some(pool) = self.owner[low as usize] {
            return self.root(pool);
        }
        let border = BinaryHeap::from([Reverse(self.rank[low as usize])]);
        self.pools.push(Pool { border, ..Pool::default() });
        self.joined_into.push(self.pools.len() - 1);
        self.pools.len() - 1
    }

    /// The pool wets the lowest node at its border, and beads until that is a cell.
    fn give(&mut self, pool: usize) -> Given {
        loop {
            let Some(Reverse(rank)) = self.pools[pool].border.pop() else {
                panic!("a pool is given more than its walls hold");
            };
            let node = self.order[rank as usize];
            let owner = self.owner[node as usize].map(|other| self.root(other));
            if owner == Some(pool) {
                continue;
            }
            let is_below = self.pools[pool].deepest.is_some() && rank < self.pools[pool].stands_at;
            if is_below {
                self.pools[pool].border.push(Reverse(rank));
                return Given::Over(node);
            }
            if let Some(other) = owner {
                self.join(pool, other);
                continue;
            }
            self.pools[pool].stands_at = rank;
            self.pools[pool].deepest.get_or_insert(rank);
            if self.grid.is_exit[node as usize] {
                self.pools[pool].border.push(Reverse(rank));
                return Given::Left;
            }
            self.owner[node as usize] = Some(pool);
            for &next in &self.grid.links[node as usize] {
                if self.owner[next as usize] != Some(pool) {
                    self.pools[pool].border.push(Reverse(self.rank[next as usize]));
                }
            }
            if (node as usize) < self.grid.n_cells {
                self.pools[pool].n_cells += 1;
                self.pools[pool].moment += self.grid.at[node as usize].coords;
                return Given::Kept;
            }
        }
    }

    fn join(&mut self, pool: usize, other: usize) {
        let mut gone = std::mem::take(&mut self.pools[other]);
        self.joined_into[other] = pool;
        let kept = &mut self.pools[pool];
        kept.border.append(&mut gone.border);
        kept.deepest = kept.deepest.min(gone.deepest);
        kept.stands_at = kept.stands_at.max(gone.stands_at);
        kept.n_cells += gone.n_cells;
        kept.moment += gone.moment;
    }

    /// The low point that liquid reaches from a node. It falls along the plumb line: of the lower nodes next to it, it
    /// takes the one nearest to that line. On a wall, and where a wall has led it away, a new plumb line starts.
    fn lands(&mut self, from: u32) -> u32 {
        if let Some(&low) = self.landing.get(&from) {
            return low;
        }
        let grid = self.grid;
        let across = |node: u32| self.up.y * grid.at[node as usize].x - self.up.x * grid.at[node as usize].y;
        let (mut node, mut plumb) = (from, across(from));
        loop {
            let off = |node: u32| (across(node) - plumb).abs();
            let lower =
                grid.links[node as usize].iter().filter(|&&n| self.rank[n as usize] < self.rank[node as usize]);
            let Some(&next) = lower.min_by(|&&a, &&b| off(a).total_cmp(&off(b))) else { break };
            if next as usize >= grid.n_cells || off(next) > grid.step {
                plumb = across(next);
            }
            node = next;
        }
        self.landing.insert(from, node);
        node
    }
}
