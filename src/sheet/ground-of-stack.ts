/** Both sheets' ground, their terminals, and where the device is alive. */
import { maskMap, pixelCount } from '../grid/maps.ts';
import type { MaskMap } from '../grid/maps.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { layerMask } from '../read/footprint.ts';
import type { OutlineLayer } from '../read/sample.ts';
import { groundOfSheet } from './ground-of-sheet.ts';
import type { SheetGround } from './ground-of-sheet.ts';
import type { SheetInput } from './sheet-input.ts';

export interface StackGround {
  readonly emitter: SheetGround;
  readonly injector: SheetGround;
  /** Shape rows·columns, 1 on footprint that both sheets join to their terminals. */
  readonly live: Uint8Array;
  /** As in `Sheet`. */
  readonly unconnected?: MaskMap;
  readonly warnings: readonly Notice[];
}

/** Rasterises the outlines and follows both sheets from their terminals. */
export function groundOfStack(input: SheetInput): StackGround {
  const { grid, footprint } = input;
  const warnings: Notice[] = [];
  const emitter = sheetGround(input, 'emitter', warnings);
  const injector = sheetGround(input, 'injector', warnings);
  const live = new Uint8Array(pixelCount(grid));
  const unconnected = emitter.drawn || injector.drawn ? maskMap(grid) : undefined;
  for (let p = 0; p < live.length; p++) {
    const i = (Math.floor(p / grid.columns) + 1) * (grid.columns + 2) + (p % grid.columns) + 1;
    const within = footprint.data[p] === 1;
    if (within && emitter.reached[i] === 1 && injector.reached[i] === 1) live[p] = 1;
    if (unconnected) {
      const apart = emitter.ground[i] === 1 && emitter.reached[i] === 0;
      const apartBelow = within && injector.ground[i] === 1 && injector.reached[i] === 0;
      if (apart || apartBelow) unconnected.data[p] = 1;
    }
  }
  return { emitter, injector, live, warnings, ...(unconnected && { unconnected }) };
}

function sheetGround(input: SheetInput, sheet: 'emitter' | 'injector', warnings: Notice[]): SheetGround {
  const { grid, footprint, outlines } = input;
  const sheetOhm = sheet === 'emitter' ? input.emitterSheetOhm : input.injectorSheetOhm;
  const contact = `contact-${sheet}` as const;
  const has = (layer: OutlineLayer) => outlines.some((outline) => outline.layer === layer);
  const ground = groundOfSheet(
    grid,
    has(sheet) ? layerMask(grid, outlines, sheet).data : footprint.data,
    has(contact) ? layerMask(grid, outlines, contact).data : undefined,
    (sheetOhm ?? 0) > 0,
  );
  if (!ground.drawn && (sheetOhm ?? 0) > 0) warnings.push(notice('sheet-fed-all-round', { sheet }));
  if (ground.drawn && !ground.reached.includes(1)) warnings.push(notice('sheet-contact-apart', { sheet }));
  return ground;
}
