//! Steps of the heat equation: the two-stage, second-order, stiffly accurate singly diagonal implicit rule, gamma = 1 - 1/sqrt(2).
//!
//! R. Alexander, "Diagonally implicit Runge-Kutta methods for stiff O.D.E.'s", SIAM J. Numer. Anal. 14, 1006-1021 (1977), theorem 5,
//! from memory; its order and damping are checked below. L-stable: heat that jumps in at one instant leaves no ringing. Both stages take
//! the same matrix, C / (gamma dt) + K, factorised once a step size.

use std::f64::consts::FRAC_1_SQRT_2;

use super::operator::HeatOperator;
use crate::fault::SolveFault;
use crate::linear::{Factor, RESIDUAL_LIMIT, check_residual};

const GAMMA: f64 = 1.0 - FRAC_1_SQRT_2;

/// The factor of one step size.
pub(crate) struct HeatFactor {
    dt_s: f64,
    /// C / (gamma dt), W/K.
    shift: Vec<f64>,
    factor: Factor,
}

/// Buffers of a step.
#[derive(Debug, Default)]
pub(crate) struct Workspace {
    stage: Vec<f64>,
    right: Vec<f64>,
}

impl HeatFactor {
    /// Factorises for steps of `dt_s`.
    ///
    /// # Errors
    /// A factorisation that fails.
    pub(crate) fn new(operator: &HeatOperator, dt_s: f64) -> Result<Self, SolveFault> {
        let shift: Vec<f64> = operator.capacity.iter().map(|c| c / (GAMMA * dt_s)).collect();
        let factor = Factor::new(&operator.pattern, &operator.conduction, Some(&shift))?;
        Ok(Self { dt_s, shift, factor })
    }

    /// Advances the temperatures above ambient by a step; the heat given off to the air in it, J.
    ///
    /// # Errors
    /// Not finite, or a residual.
    pub(crate) fn step(
        &mut self,
        operator: &HeatOperator,
        above: &mut [f64],
        work: &mut Workspace,
    ) -> Result<f64, SolveFault> {
        work.right.clear();
        work.right.extend(above.iter().zip(&self.shift).map(|(v, s)| v * s));
        let first = self.stage(operator, work)?;
        // The second stage starts from v + dt (1 - gamma) f(stage 1), f(stage 1) = (stage 1 - v) / (gamma dt).
        let lead = (1.0 - GAMMA) / GAMMA;
        for ((right, v), (stage, shift)) in
            work.right.iter_mut().zip(above.iter()).zip(work.stage.iter().zip(&self.shift))
        {
            *right = shift * (v + lead * (stage - v));
        }
        let second = self.stage(operator, work)?;
        above.copy_from_slice(&work.stage);
        Ok(self.dt_s * ((1.0 - GAMMA) * first + GAMMA * second))
    }

    /// Solves for a stage; heat rate to the air in it, W.
    fn stage(&mut self, operator: &HeatOperator, work: &mut Workspace) -> Result<f64, SolveFault> {
        work.stage.clear();
        work.stage.extend_from_slice(&work.right);
        self.factor.solve_in_place(&mut work.stage);
        check_residual(&operator.conduction, Some(&self.shift), &work.stage, &work.right, RESIDUAL_LIMIT)?;
        Ok(operator.film.iter().zip(&work.stage).map(|(h, v)| h * v).sum())
    }
}

/// A period as stretches that double, each walked in a few even steps: heat that jumps in spreads fast at first and slowly later.
pub(crate) struct Period {
    factors: Vec<HeatFactor>,
    steps: usize,
    work: Workspace,
}

/// Steps a stretch on the coarsest level; even, so that 3/2 of it is whole.
const STEPS: usize = 2;
/// Stretches at most: they double, so that the first is a millionth of the period.
const MOST_STRETCHES: u32 = 20;

impl Period {
    /// A period of `length_s` whose first stretch is no longer than `first_s`, on the level `refinement`.
    ///
    /// # Errors
    /// A factorisation that fails.
    pub(crate) fn new(
        operator: &HeatOperator,
        length_s: f64,
        first_s: f64,
        refinement: lenzbore_mesh::Refinement,
    ) -> Result<Self, SolveFault> {
        let parts = |n: u32| 2.0_f64.powi(n.cast_signed()) - 1.0;
        let stretches = (1..MOST_STRETCHES).find(|&n| length_s / parts(n) <= first_s).unwrap_or(MOST_STRETCHES);
        let steps = refinement.times(STEPS);
        #[expect(clippy::cast_precision_loss, reason = "a small whole number")]
        let dt = length_s / parts(stretches) / steps as f64;
        let of = |n: u32| HeatFactor::new(operator, dt * 2.0_f64.powi(n.cast_signed()));
        Ok(Self { factors: (0..stretches).map(of).collect::<Result<_, _>>()?, steps, work: Workspace::default() })
    }

    /// Conducts for a whole period; the heat given off to the air, J. `seen` is shown the temperatures after every step.
    ///
    /// # Errors
    /// Not finite, or a residual.
    pub(crate) fn conduct(
        &mut self,
        operator: &HeatOperator,
        above: &mut [f64],
        mut seen: impl FnMut(&[f64]),
    ) -> Result<f64, SolveFault> {
        let mut lost = 0.0;
        for factor in &mut self.factors {
            for _ in 0..self.steps {
                lost += factor.step(operator, above, &mut self.work)?;
                seen(above);
            }
        }
        Ok(lost)
    }
}
