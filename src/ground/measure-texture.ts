import type { Grid } from '../grid/maps.ts';
import type { HeightGround } from './ground.ts';
import { levellingBias } from './levelling-bias.ts';
import type { LevellingBias, NoBias } from './levelling-bias.ts';
import type { GroundSection } from './recipe.ts';
import { surfaceTexture } from './texture.ts';
import type { SurfaceTexture } from './texture.ts';

export interface Texture extends SurfaceTexture {
  /** What levelling took from the roughness, or why that cannot be said. */
  readonly levelling: LevellingBias | NoBias;
}

/**
 * Texture of the flawless measured ground, and what levelling itself took from its Sq.
 *
 * @param counted 1 on the footprint. @param flaws numbers of flaws, 0 for none. Repaired pixels were not measured and do not count.
 * @param terraces numbers of terraces, −128 unknown; absent where no current tells them.
 * @returns undefined where no pixel is left.
 */
export function measureTexture({ levelled, repaired }: HeightGround, grid: Grid, counted: Uint8Array, flaws: Uint32Array, section: GroundSection, terraces?: Int8Array): Texture | undefined {
  const mask = new Uint8Array(counted.length);
  for (let i = 0; i < mask.length; i++) mask[i] = counted[i] === 1 && flaws[i] === 0 && repaired.data[i] === 0 ? 1 : 0;
  const surface = surfaceTexture(levelled.data, grid, mask);
  return surface.pixels === 0 ? undefined : { ...surface, levelling: levellingBias(levelled.data, grid, mask, section, terraces) };
}
