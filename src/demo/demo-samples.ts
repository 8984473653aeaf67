/** The demo: six samples of an invented laboratory, as the files its microscope would have exported. */
import type { Grid } from '../grid/maps.ts';
import { writeStatement } from '../read/tiff-statement.ts';
import { writeGeoTiff } from '../report/geotiff-writer.ts';
import type { DemoScene } from './demo-scenes.ts';
import { demoScenes } from './demo-scenes.ts';
import { paintScene } from './paint-scene.ts';

// Module-scoped because the science is compiled without DOM and Node types; every realm has it.
declare const TextEncoder: new () => { encode(text: string): Uint8Array };

export interface DemoFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

export interface DemoSample {
  readonly name: string;
  readonly title: string;
  /** Names of the files that `demoFiles` gives, known without painting. */
  readonly files: readonly string[];
}

/** The demo samples in the order of the tray. */
export const demoSamples: readonly DemoSample[] = demoScenes.map((scene) => ({ name: scene.name, title: scene.title, files: fileNames(scene) }));

/**
 * Files of one demo sample: `NAME.height.tif` (nm, as scanned, nothing levelled), `NAME.current.tif` (A), the sidecar `NAME.json`, and for a
 * flake that ends within the map `NAME.outlines.geojson`. The same name and size give the same bytes.
 *
 * @param size columns and rows of the maps; pixels are not square where the scan is not.
 * @throws RangeError for an unknown name or a size that is no whole number from 16 to 8192.
 */
export function demoFiles(name: string, size = 512): DemoFile[] {
  const found = demoScenes.find((scene) => scene.name === name);
  if (!found) throw new RangeError(`there is no demo sample called ${name}`);
  if (!Number.isInteger(size) || size < 16 || size > 8192) throw new RangeError(`a demo map of ${size} × ${size} pixels cannot be painted; choose 16 to 8192`);
  const { scene } = found;
  const { height, current } = paintScene({ ...scene, columns: size, rows: size });
  const grid: Grid = { columns: size, rows: size, pitchXM: (scene.widthUm * 1e-6) / size, pitchYM: (scene.heightUm * 1e-6) / size };
  const heightNm = height.map((value) => value * 1e9);
  return [
    { name: `${name}.current.tif`, bytes: writeGeoTiff(grid, current, writeStatement({ quantity: 'current', unit: 'A', pitchUnit: 'um', direction: 'forward', biasV: scene.scanBiasV })) },
    { name: `${name}.height.tif`, bytes: writeGeoTiff(grid, heightNm, writeStatement({ quantity: 'height', unit: 'nm', pitchUnit: 'um', direction: 'forward' })) },
    { name: `${name}.json`, bytes: textBytes(sidecarOf(found)) },
    ...(found.barrierUm ? [{ name: `${name}.outlines.geojson`, bytes: textBytes(outlinesOf(found.barrierUm)) }] : []),
  ];
}

function fileNames({ name, barrierUm }: DemoScene): string[] {
  return [`${name}.current.tif`, `${name}.height.tif`, `${name}.json`, ...(barrierUm ? [`${name}.outlines.geojson`] : [])];
}

function sidecarOf({ name, title, scene }: DemoScene): object {
  return {
    sample: name, widthUm: scene.widthUm, heightUm: scene.heightUm, heightUnit: 'nm', currentUnit: 'A', biasV: scene.scanBiasV, surface: 'barrier',
    role: `invented demo sample: ${title}`,
  };
}

function outlinesOf(cornersUm: readonly (readonly [x: number, y: number])[]): object {
  return {
    type: 'FeatureCollection',
    features: [{ type: 'Feature', properties: { layer: 'barrier' }, geometry: { type: 'Polygon', coordinates: [[...cornersUm, cornersUm[0]]] } }],
  };
}

function textBytes(json: object): Uint8Array {
  return new TextEncoder().encode(`${JSON.stringify(json, null, 2)}\n`);
}
