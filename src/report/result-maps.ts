/** The maps an appraisal writes as GeoTIFF, as far as their data exist. */
import { writeStatement } from '../read/tiff-statement.ts';
import type { TiffStatement } from '../read/tiff-statement.ts';
import type { Appraised } from './appraised.ts';
import { writeGeoTiff } from './geotiff-writer.ts';
import type { TiffValues } from './geotiff-writer.ts';

/** A file of the result folder; `bytes` makes its content when asked, so that maps are not all held at once. */
export interface ResultMap {
  readonly file: string;
  readonly bytes: () => Uint8Array;
}

/**
 * causes.tif (codes), flaws.tif (numbers of flaws.csv), height.tif (nm, levelled), current.tif (A, offset
 * removed), conditioned.tif (A, drift undone), barrier.tif (nm), bias-thickness.tif (nm, by maps at several biases), layers.tif (0 unknown), glow.tif (1 = median
 * of usable). Without amperes the two currents are in the file's own unit and say `relative`.
 */
export function resultMaps({ sample: { grid }, ground, flaws, barrier, ledger }: Appraised): ResultMap[] {
  const { height, current } = ground;
  const map = (file: string, statement: Omit<TiffStatement, 'pitchUnit'>, values: () => TiffValues): ResultMap => ({
    file, bytes: () => writeGeoTiff(grid, values(), writeStatement({ ...statement, pitchUnit: 'um' })),
  });
  const maps = [
    map('causes.tif', { quantity: 'causes' }, () => ledger.codes.data),
    map('flaws.tif', { quantity: 'flaws' }, () => flaws.labels.data),
  ];
  if (height) maps.push(map('height.tif', { quantity: 'height', unit: 'nm' }, () => inNm(height.levelled.data)));
  if (current) {
    // These maps are already turned by the bias's sign, so the bias that goes with them is positive.
    const statement = { quantity: 'current', unit: current.unit, ...(current.biasV === undefined ? {} : { biasV: Math.abs(current.biasV) }) };
    maps.push(map('current.tif', statement, () => current.offsetFree.data));
    maps.push(map('conditioned.tif', statement, () => current.conditioned.data));
  }
  const { thickness, layers } = barrier ?? {};
  if (thickness) maps.push(map('barrier.tif', { quantity: 'thickness', unit: 'nm' }, () => inNm(thickness.data)));
  const { biases } = barrier ?? {};
  if (biases) maps.push(map('bias-thickness.tif', { quantity: 'thickness', unit: 'nm' }, () => inNm(biases.thickness)));
  if (layers) maps.push(map('layers.tif', { quantity: 'layers' }, () => layers.data));
  if (current) maps.push(map('glow.tif', { quantity: 'glow', unit: 'relative' }, () => ledger.glow.data));
  return maps;
}

function inNm(metres: Float32Array): Float32Array {
  const nm = new Float32Array(metres.length);
  for (let i = 0; i < nm.length; i++) nm[i] = metres[i]! * 1e9;
  return nm;
}
