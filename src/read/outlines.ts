/** Outlines of flakes, contacts and keep-outs from GeoJSON in µm. Source: RFC 7946 (2016), with a plane instead of the Earth. */
import { Problem } from '../problems/problem.ts';
import type { InputFile } from './input.ts';
import type { Outline, OutlineLayer } from './sample.ts';
import { textOf } from './text.ts';

export const outlineLayers = ['injector', 'barrier', 'emitter', 'contact-injector', 'contact-emitter', 'keep-out'] as const satisfies readonly OutlineLayer[];

type Json = Readonly<Record<string, unknown>>;
type Ring = readonly (readonly [xM: number, yM: number])[];

/**
 * Polygons of a GeoJSON file in metres, x right, y up, origin at the map's lower-left corner. Takes a
 * FeatureCollection or one Feature of Polygon or MultiPolygon; the property `layer` says what each is.
 * Rings keep their closing point. Throws `outlines-not-json`, `outlines-layer`, `outlines-shape`.
 */
export function readOutlines(file: InputFile): Outline[] {
  let json: unknown;
  try {
    json = JSON.parse(textOf(file.bytes));
  } catch (error) {
    throw new Problem('outlines-not-json', { file: file.name, reason: error instanceof Error ? error.message.slice(0, 120) : 'unreadable' });
  }
  const features = isObject(json) && json['type'] === 'Feature' ? [json] : isObject(json) && json['type'] === 'FeatureCollection' ? json['features'] : undefined;
  if (!Array.isArray(features)) throw new Problem('outlines-not-json', { file: file.name, reason: 'it is no FeatureCollection' });
  return features.flatMap((feature: unknown, i) => featureOutlines(file.name, `feature ${i + 1}`, feature));
}

function featureOutlines(file: string, place: string, feature: unknown): Outline[] {
  const wrong = (reason: string) => new Problem('outlines-shape', { file, place, reason });
  if (!isObject(feature) || feature['type'] !== 'Feature') throw wrong('it is no Feature; write one Feature per outline');
  const properties = feature['properties'];
  const found = isObject(properties) ? properties['layer'] : undefined;
  const layer = outlineLayers.find((known) => known === found);
  if (layer === undefined) {
    throw new Problem('outlines-layer', { file, place, found: found === undefined ? 'is missing' : `${JSON.stringify(found).slice(0, 40)} is not known`, known: outlineLayers.join(', ') });
  }
  const geometry = feature['geometry'];
  if (!isObject(geometry)) throw wrong('it has no geometry; give it a Polygon');
  const { type, coordinates } = geometry;
  const polygons = type === 'Polygon' ? [coordinates] : type === 'MultiPolygon' ? coordinates : undefined;
  if (!Array.isArray(polygons)) throw wrong(`its geometry is ${JSON.stringify(type)}; use Polygon or MultiPolygon`);
  return polygons.map((polygon: unknown) => {
    if (!Array.isArray(polygon) || polygon.length === 0) throw wrong('a polygon has no ring; give its outer boundary');
    return { layer, rings: polygon.map((ring: unknown, r) => readRing(ring, (reason) => wrong(`ring ${r + 1} ${reason}`))) };
  });
}

function readRing(ring: unknown, wrong: (reason: string) => Problem): Ring {
  if (!Array.isArray(ring) || ring.length < 4) throw wrong('has fewer than four points; a triangle is four, its first point repeated last');
  const points = ring.map((point: unknown, i): [number, number] => {
    const [x, y] = Array.isArray(point) ? point as unknown[] : [];
    if (typeof x !== 'number' || typeof y !== 'number' || !Number.isFinite(x) || !Number.isFinite(y)) throw wrong(`has no pair of numbers at point ${i + 1}`);
    return [x * 1e-6, y * 1e-6];
  });
  const first = points[0]!;
  const last = points.at(-1)!;
  if (first[0] !== last[0] || first[1] !== last[1]) throw wrong('is not closed; repeat its first point as the last');
  return points;
}

function isObject(value: unknown): value is Json {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
