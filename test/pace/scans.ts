/** Seeded scans as files: what the benchmark reads. */
import { defaultScene } from '../../src/demo/scene.ts';
import { paintScene } from '../../src/demo/paint-scene.ts';
import type { Grid } from '../../src/grid/maps.ts';
import type { InputFile } from '../../src/read/input.ts';
import { writeStatement } from '../../src/read/tiff-statement.ts';
import { writeGeoTiff } from '../../src/report/geotiff-writer.ts';

/** Height and current of the same 10 µm × 10 µm scene at any pixel count, as two GeoTIFFs that state unit, size and bias. */
export function paintedFiles(side: number): InputFile[] {
  const scene = { ...defaultScene, seed: 'pace', columns: side, rows: side };
  const { height, current } = paintScene(scene);
  const grid: Grid = { columns: side, rows: side, pitchXM: (scene.widthUm * 1e-6) / side, pitchYM: (scene.heightUm * 1e-6) / side };
  return [
    { name: 'pace.current.tif', bytes: writeGeoTiff(grid, current, writeStatement({ quantity: 'current', unit: 'A', pitchUnit: 'um', biasV: scene.scanBiasV })) },
    { name: 'pace.height.tif', bytes: writeGeoTiff(grid, height, writeStatement({ quantity: 'height', unit: 'm', pitchUnit: 'um' })) },
  ];
}
