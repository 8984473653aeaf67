/** One multigrid cycle as a symmetric preconditioner of the linearised sheets. */
import type { Level } from './network.ts';
import { addCorrection, relax, restrictResidual } from './relax.ts';

/** Sweeps before and after the coarser level's correction. */
const sweeps = 1;

/**
 * One V-cycle from level `from` on: reads each field's `rhs`, leaves an approximate solution in its
 * `x`. The sweeps after the correction mirror those before it, which keeps the map from rhs to x
 * symmetric and positive, as conjugate gradients need. Relaxation and transfer after Wesseling,
 * Theor. Comput. Fluid Dyn. 1 (1988), cell-centred multigrid for interface problems: constants as
 * prolongation, sums as restriction, conductances rebuilt at the coarser pitch.
 */
export function cycle(levels: readonly Level[], from: number): void {
  const level = levels[from]!;
  const next = levels[from + 1];
  for (const field of level.fields) field.x.fill(0);
  for (let k = 0; k < sweeps; k++) {
    relax(level, 0);
    relax(level, 1);
  }
  if (next) {
    restrictResidual(level, next);
    cycle(levels, from + 1);
    addCorrection(level, next);
  }
  for (let k = 0; k < sweeps; k++) {
    relax(level, 1);
    relax(level, 0);
  }
}
