/** Voltage drop with tunnel elements of any shape: Newton's method, started on a coarse grid. */
import { conjugateGradients, workspace } from './conjugate-gradients.ts';
import type { Workspace } from './conjugate-gradients.ts';
import { hierarchy } from './network.ts';
import type { Level } from './network.ts';
import { spreadSlopes } from './tunnel-slopes.ts';
import type { TunnelCurve } from './tunnel-curve.ts';

export interface Settled {
  /** Drop between terminal and pixel in volts per sheet, one ringed array after the other. */
  readonly drops: Drops;
  readonly converged: boolean;
  /** 2-norm of what flows into pixels and not out of them, over that of the tunnel currents. */
  readonly residual: number;
  /** Newton steps on the finest grid, and conjugate-gradient steps there. */
  readonly steps: number;
  readonly iterations: number;
}

/**
 * Drops as unevaluated sums high + low. A well conducting sheet behind a poor contact carries a large
 * even drop whose tiny differences are the whole current: one double would round them away.
 */
export interface Drops {
  readonly high: Float64Array;
  readonly low: Float64Array;
}

/** Bias left across the element in pixel `i`; `second` is the offset of the second sheet's drops, 0 without one. */
export function localBias({ high, low }: Drops, biasV: number, i: number, second: number): number {
  const left = biasV - high[i]! - low[i]!;
  return second === 0 ? left : left - high[second + i]! - low[second + i]!;
}

interface Balance {
  readonly residual: number;
  readonly current: number;
}

/** Cold starts happen on a grid of at most this many pixels, where even many steps cost nothing. */
const coldPixels = 1024;
const maxSteps = 200;
const maxHalvings = 40;
/** Steps in a row without gain, and conjugate-gradient steps on one grid, before giving up. Usual are none and 30. */
const patience = 4;
const maxIterations = 1000;

/**
 * Finds the drops a (sheet 0) and b (sheet 1) with L_a·a = J(V − a − b) and L_b·b = J(V − a − b), the
 * finite-volume form of div(1/R grad u) = J. J rises with its bias, so the drops are the minimum of a
 * convex energy: each Newton step goes downhill, and is shortened only where it would climb the other
 * side. The coarse grid's answer starts the next finer one (nested iteration), so the finest grid sees
 * few steps whatever the resistance. The linear solve is as exact as the step deserves (Eisenstat &
 * Walker, SIAM J. Sci. Comput. 17, 16, 1996, choice 2).
 *
 * Converged means a residual ≤ 1e-10.
 */
export function settle(finest: Level, curves: readonly TunnelCurve[]): Settled {
  const levels = hierarchy(finest);
  const work = workspace(finest);
  let from = levels.findIndex((level) => level.columns * level.rows <= coldPixels);
  let drops = noDrop(levels[from]!);
  let settled = settleLevel(levels, from, drops, curves, work);
  while (from > 0) {
    from--;
    drops = spread(levels[from]!, levels[from + 1]!, drops);
    settled = settleLevel(levels, from, drops, curves, work);
  }
  return settled;
}

function noDrop(level: Level): Drops {
  const length = level.size * level.fields.length;
  return { high: new Float64Array(length), low: new Float64Array(length) };
}

function settleLevel(levels: readonly Level[], from: number, drops: Drops, curves: readonly TunnelCurve[], work: Workspace): Settled {
  const level = levels[from]!;
  // Coarser levels only prepare the next one.
  const goal = from > 0 ? 1e-4 : 1e-10;
  let { residual, current } = balance(level, drops, curves, work.residual);
  let forcing = 0.05;
  let iterations = 0;
  let steps = 0;
  let stalled = 0;
  while (residual > goal * current && steps < maxSteps && iterations < maxIterations && stalled < patience) {
    spreadSlopes(levels, from);
    const before = residual;
    const solved = conjugateGradients(levels, from, work, Math.max(forcing, (0.3 * goal * current) / residual));
    iterations += solved.iterations;
    steps++;
    ({ residual, current } = advance(level, drops, curves, work, solved.decrease));
    forcing = Math.min(0.05, Math.max(0.9 * (residual / before) ** 2, 1e-8));
    stalled = residual > 0.99 * before ? stalled + 1 : 0;
  }
  const relative = current > 0 ? residual / current : 0;
  return { drops, converged: relative <= goal, residual: relative, steps, iterations };
}

/** Takes the step, halved until the energy's slope along it is no longer steeply upwards. */
function advance(level: Level, drops: Drops, curves: readonly TunnelCurve[], work: Workspace, decrease: number): Balance {
  const { high, low } = drops;
  const length = high.length;
  const { step, residual } = work;
  let taken = 0;
  let share = 1;
  for (let halvings = 0; ; halvings++) {
    for (let i = 0; i < length; i++) {
      // Two-sum (Knuth): what the addition rounds away goes into `low`.
      const before = high[i]!;
      const change = (share - taken) * step[i]!;
      const after = before + change;
      const part = after - before;
      high[i] = after;
      low[i]! += (before - (after - part)) + (change - part);
    }
    taken = share;
    const result = balance(level, drops, curves, residual);
    let along = 0;
    for (let i = 0; i < length; i++) along -= residual[i]! * step[i]!;
    if (along <= 0.9 * decrease || halvings === maxHalvings) return result;
    share /= 2;
  }
}

/** Current that arrives in each pixel and does not leave it, into `residual`; the elements' slopes, into the level. */
function balance(level: Level, drops: Drops, curves: readonly TunnelCurve[], residual: Float64Array): Balance {
  const { fields, size, width, columns, rows, source, curve, slope0, slope1, slope01 } = level;
  const both = fields.length === 2;
  const free0 = fields[0]!.free;
  const free1 = both ? fields[1]!.free : free0;
  const { high, low } = drops;
  residual.fill(0, 0, high.length);
  let current = 0;
  for (let i = 0; i < size; i++) {
    const full = source[i]!;
    if (full === 0) continue;
    const tunnel = curves[curve[i]!]!;
    tunnel.at(localBias(drops, tunnel.biasV, i, both ? size : 0));
    const flow = full * tunnel.density;
    const slope = full * tunnel.slope;
    current += flow * flow;
    residual[i] = free0[i]! * flow;
    slope0[i] = free0[i]! * slope;
    if (both) {
      residual[size + i] = free1[i]! * flow;
      slope1[i] = free1[i]! * slope;
      slope01[i] = free0[i]! * free1[i]! * slope;
    }
  }
  let norm = 0;
  for (let f = 0; f < fields.length; f++) {
    const { right, down, feed, free } = fields[f]!;
    const offset = f * size;
    for (let r = 1; r <= rows; r++) {
      for (let i = r * width + 1; i <= r * width + columns; i++) {
        if (free[i] === 0) continue;
        const k = offset + i;
        const here = high[k]!;
        const fine = low[k]!;
        // Neighbours' high parts differ exactly (Sterbenz), so the low parts are not lost.
        const rest = residual[k]! - feed[i]! * here
          - right[i]! * (here - high[k + 1]! + (fine - low[k + 1]!)) - right[i - 1]! * (here - high[k - 1]! + (fine - low[k - 1]!))
          - down[i]! * (here - high[k + width]! + (fine - low[k + width]!)) - down[i - width]! * (here - high[k - width]! + (fine - low[k - width]!));
        residual[k] = rest;
        norm += rest * rest;
      }
    }
  }
  return { residual: Math.sqrt(norm), current: Math.sqrt(current) };
}

/** Starts a level with the coarser one's drops. */
function spread(level: Level, next: Level, coarse: Drops): Drops {
  const drops = noDrop(level);
  for (let f = 0; f < level.fields.length; f++) {
    const { free } = level.fields[f]!;
    for (let r = 0; r < level.rows; r++) {
      const i0 = (r + 1) * level.width + 1;
      const j0 = f * next.size + ((r >> level.shiftY) + 1) * next.width + 1;
      for (let c = 0; c < level.columns; c++) drops.high[f * level.size + i0 + c] = free[i0 + c]! * coarse.high[j0 + (c >> level.shiftX)]!;
    }
  }
  return drops;
}
