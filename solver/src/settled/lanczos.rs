//! Builds the recurrence, a vector at a time, without allocation inside one.

use super::level::convect;
use super::recurrence::{RECURRENCE_LIMIT, Recurrence};
use crate::direct::DirectFactor;
use crate::fault::SolveFault;
use crate::linear::RESIDUAL_LIMIT;
use crate::operators::Operators;

/// What a step came to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Came {
    /// A vector more.
    On,
    /// The reaction at the wanted speed has converged, the space is exhausted, or no more vectors are wanted.
    ToItsEnd,
}

/// The recurrence under way.
pub(super) struct Lanczos<'o> {
    operators: &'o Operators,
    factor: &'o mut DirectFactor,
    /// C v_k + `beta_k` K v_(k-1) at the wall nodes, then K v_k.
    current: Vec<f64>,
    next: Vec<f64>,
    right: Vec<f64>,
    vector: Vec<f64>,
    pub(super) recurrence: Recurrence,
    /// Largest relative residual of a back-solve.
    pub(super) residual: f64,
}

impl<'o> Lanczos<'o> {
    /// Starts from the mover's own field, of the given slope d psi_0/dz at the wall nodes.
    pub(super) fn new(operators: &'o Operators, factor: &'o mut DirectFactor, slope: &[f64]) -> Self {
        let wall = &operators.wall;
        let mut right = vec![0.0; operators.unknowns()];
        right.fill(0.0);
        Self {
            current: wall.conductance.iter().zip(slope).map(|(g, q)| g * q).collect(),
            next: vec![0.0; wall.len()],
            vector: right.clone(),
            right,
            recurrence: Recurrence::new(wall.len()),
            residual: 0.0,
            operators,
            factor,
        }
    }

    /// One vector more, unless the reaction at `velocity` has converged or there are `most` of them. Allocates nothing while
    /// [`Recurrence::make_room`] has made room.
    ///
    /// # Errors
    /// A back-solve that is not finite or leaves too large a residual.
    pub(super) fn step(&mut self, velocity: f64, most: usize) -> Result<Came, SolveFault> {
        let wall = &self.operators.wall;
        for (&u, &c) in wall.unknown.iter().zip(&self.current) {
            self.right[u] = c;
        }
        self.vector.copy_from_slice(&self.right);
        self.factor.solve_in_place(&mut self.vector);
        let residual = self.factor.check(self.operators, &self.vector, &self.right, RESIDUAL_LIMIT)?;
        self.residual = self.residual.max(residual);
        let square: f64 = wall.unknown.iter().zip(&self.current).map(|(&u, c)| c * self.vector[u]).sum();
        let beta = square.max(0.0).sqrt();
        let vectors = self.recurrence.len();
        if vectors == 0 {
            self.recurrence.beta_1 = beta;
        } else {
            self.recurrence.betas.push(beta);
            if vectors >= most || self.recurrence.residual(velocity) < RECURRENCE_LIMIT {
                return Ok(Came::ToItsEnd);
            }
        }
        if beta <= f64::MIN_POSITIVE {
            return Ok(Came::ToItsEnd);
        }
        self.vector.iter_mut().for_each(|x| *x /= beta);
        self.current.iter_mut().for_each(|x| *x /= beta);
        self.recurrence.currents.push(self.current.iter().copied());
        self.recurrence.fluxes.push(wall.unknown.iter().map(|&u| self.vector[u]));
        convect(self.operators, &self.vector, &mut self.next);
        if vectors > 0 {
            let previous = self.recurrence.currents.get(vectors - 1);
            self.next.iter_mut().zip(previous).for_each(|(n, p)| *n += beta * p);
        }
        std::mem::swap(&mut self.current, &mut self.next);
        Ok(Came::On)
    }
}
