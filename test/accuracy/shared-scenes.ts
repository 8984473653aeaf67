/** Scenes with known truth that are kept beside the project (../shared/scenes), where they are at hand. */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { decodeMaps } from '../../src/read/decode.ts';
import type { InputFile } from '../../src/read/input.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import type { Sample } from '../../src/read/sample.ts';
import { channelOf } from '../../src/read/sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { median } from '../../src/stats/median.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { saturationA } from './paint-current.ts';
import type { RoundObject, Truth } from './paint-truth.ts';

const folder = fileURLToPath(new URL('../../../shared/scenes/', import.meta.url));

/** What a scene's facts say, as far as it is used here; lengths in nm, y from the top. */
interface Facts {
  readonly whiteNoiseNm: number;
  readonly lagPixels?: number;
  readonly wear?: { readonly decadesTopToBottom: number };
  readonly objects: readonly { readonly kind: string; readonly x: number; readonly y: number; readonly r?: number }[];
}

export function sharedNames(): string[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder).filter((name) => name.endsWith('.height.tif')).map((name) => name.slice(0, -'.height.tif'.length)).sort();
}

export async function sharedScene(name: string, changes: RecipeChanges): Promise<{ sample: Sample; truth: Truth }> {
  const read = (file: string): InputFile => ({ name: file, bytes: new Uint8Array(readFileSync(folder + file)) });
  const files = readdirSync(folder).filter((file) => file.startsWith(`${name}.`));
  const group = groupInputs(files.map((file) => ({ name: file, explicit: false }))).samples[0]!;
  const sample = await readSample(group, files.map(read), createRecipe(changes).scan, sha256);
  const map = async (what: string): Promise<ArrayLike<number>> => (await decodeMaps(read(`truth/${name}.${what}.tif`)))[0]!.values;
  const facts = JSON.parse(readFileSync(`${folder}truth/${name}.facts.json`, 'utf8')) as Facts;
  const codes = Uint8Array.from(await map('truth'));
  const layers = Uint8Array.from(await map('layers'));
  return {
    sample,
    truth: {
      grid: sample.grid, codes, layers, cleanNm: await map('clean'), whiteNm: facts.whiteNoiseNm,
      rounds: facts.objects.flatMap(roundOf),
      wearDecades: facts.wear?.decadesTopToBottom ?? 0, lagPx: facts.lagPixels ?? 0,
      saturatedGround: saturatedLayers(codes, layers, channelOf(sample, 'current')!.values.data),
    },
  };
}

function roundOf({ kind, x, y, r }: Facts['objects'][number]): RoundObject[] {
  return (kind === 'bubble' || kind === 'pinhole') && r !== undefined ? [{ kind, xM: x * 1e-9, topM: y * 1e-9, radiusM: r * 1e-9 }] : [];
}

/** The truth does not say where the ground saturates; a layer count does whose median reading on sound ground is at the limit. */
function saturatedLayers(codes: Uint8Array, layers: Uint8Array, currentA: Float32Array): Uint8Array {
  const sound = new Set([codeOf('usable'), codeOf('thin'), codeOf('thick')]);
  const saturates = new Map<number, boolean>();
  for (const n of new Set(layers)) saturates.set(n, median(currentA.filter((_, i) => layers[i] === n && sound.has(codes[i]!))) >= 0.99 * saturationA);
  return layers.map((n) => (saturates.get(n) ? 1 : 0));
}
