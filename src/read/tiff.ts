/** TIFF, GeoTIFF and BigTIFF: one map per page, with what the tags state about size, unit and role. */
import { largestPitchM } from './decoded-map.ts';
import type { DecodedMap, PitchStatement, UnitStatement } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import { channelWords } from './channel-words.ts';
import { tags, tiffPages } from './tiff-directory.ts';
import type { TiffPage } from './tiff-directory.ts';
import { tiffLayout } from './tiff-layout.ts';
import { jsonObject, parseStatement } from './tiff-statement.ts';
import type { TiffStatement } from './tiff-statement.ts';
import { tiffValues } from './tiff-values.ts';

/**
 * All pages of a TIFF that hold full-size maps (previews and masks are left out).
 * All layouts are checked before the first page is decoded. Throws `Problem` with file and page.
 */
export async function decodeTiff(file: InputFile): Promise<DecodedMap[]> {
  const all = tiffPages(file);
  const full = all.filter((page) => (page.number(tags.subfileType, 0) & 5) === 0);
  const pages = full.length === 0 ? all : full;
  const layouts = pages.map((page) => ({ page, layout: tiffLayout(file, page) }));
  const maps: DecodedMap[] = [];
  for (const { page, layout } of layouts) {
    const { columns, rows } = layout;
    maps.push({ columns, rows, values: await tiffValues(file, page, layout), ...statements(file.name, page) });
  }
  return maps;
}

type Statements = Omit<DecodedMap, 'columns' | 'rows' | 'values'>;

function statements(file: string, page: TiffPage): Statements {
  const description = page.text(tags.description);
  const name = page.text(tags.pageName);
  const ours = parseStatement(file, description);
  const pitches = pitchStatements(page, ours);
  if (ours !== undefined) {
    const quantity = ours.quantity === 'height' || ours.quantity === 'current' ? ours.quantity : undefined;
    return {
      label: name === '' ? ours.quantity : name, pitches,
      ...(quantity === undefined ? {} : { quantity }),
      ...(ours.unit === undefined ? {} : { unit: { word: ours.unit, by: 'tag' } }),
      ...(ours.direction === undefined ? {} : { direction: ours.direction }),
      ...(ours.biasV === undefined ? {} : { biasV: ours.biasV }),
    };
  }
  const json = jsonObject(description);
  const title = name !== '' ? name : json === undefined ? shortText(description) : firstWord(json, ['quantity', 'channel', 'name', 'title']);
  const unit = unitStatement(page, json);
  return { label: title, pitches, ...channelWords(title), ...(unit === undefined ? {} : { unit }) };
}

function unitStatement(page: TiffPage, json: Readonly<Record<string, unknown>> | undefined): UnitStatement | undefined {
  const word = json === undefined ? '' : firstWord(json, ['unit', 'units']);
  if (word !== '') return { word, by: 'description' };
  // GDAL's metadata (tag 42112) is XML; its unit type is one flat element.
  const gdal = /<Item[^>]*role="unittype"[^>]*>([^<]{1,16})<\/Item>/.exec(page.text(tags.gdalMetadata))?.[1];
  return gdal === undefined ? undefined : { word: gdal, by: 'description' };
}

function pitchStatements(page: TiffPage, ours: TiffStatement | undefined): PitchStatement[] {
  const found: PitchStatement[] = [];
  const [x, y] = page.numbers(tags.pixelScale).map(Math.abs);
  if (x !== undefined && y !== undefined && x > 0 && y > 0 && Number.isFinite(x) && Number.isFinite(y)) {
    if (ours !== undefined) found.push({ by: 'tag', xM: x * 1e-6, yM: y * 1e-6 });
    else found.push({ by: 'scale', x, y, plain: !isGeographic(page) });
  }
  // 2 pixels per inch, 3 pixels per centimetre
  const lengthM = new Map([[2, 0.0254], [3, 0.01]]).get(page.number(tags.resolutionUnit, 2));
  const xM = (lengthM ?? 0) / page.number(tags.xResolution, 0);
  const yM = (lengthM ?? 0) / page.number(tags.yResolution, 0);
  if (page.has(tags.resolutionUnit) && xM > 0 && yM > 0 && xM < largestPitchM && yM < largestPitchM) found.push({ by: 'resolution', xM, yM });
  return found;
}

/** GeoTIFF key 1024 (model type): 1 projected, 2 geographic, 3 geocentric. OGC GeoTIFF 1.1 (2019), 7.4. */
function isGeographic(page: TiffPage): boolean {
  const keys = page.numbers(tags.geoKeys);
  for (let i = 4; i + 3 < keys.length; i += 4) if (keys[i] === 1024 && keys[i + 1] === 0) return [1, 2, 3].includes(keys[i + 3]!);
  return false;
}

/** A description of at most 64 characters on one line is a name; prose is not searched for words. */
function shortText(text: string): string {
  return text.length <= 64 && !text.includes('\n') ? text : '';
}

function firstWord(json: Readonly<Record<string, unknown>>, keys: readonly string[]): string {
  for (const key of keys) {
    const value = json[key];
    if (typeof value === 'string') return shortText(value);
  }
  return '';
}
