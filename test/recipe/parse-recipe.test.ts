import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { test } from 'node:test';
import { Problem } from '../../src/problems/problem.ts';
import { applySettings, checkRecipe, defaultRecipe, parseRecipe, recipeJsonSchema } from '../../src/recipe/parse-recipe.ts';
import { sections } from '../../src/recipe/recipe.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { randomRecipe } from '../fixtures/random-recipe.ts';

const head = { format: 'evenglow-recipe', version: 1 };

function refusal(run: () => unknown): Problem {
  try {
    run();
  } catch (error) {
    assert.ok(error instanceof Problem, String(error));
    return error;
  }
  assert.fail('nothing was refused');
}

for (const [changes, sentence] of [
  [{ band: { factor: 0 } }, 'recipe.band.factor: 0 is below 1.'],
  [{ band: { factor: 2e6 } }, 'recipe.band.factor: 2000000 is above 1000000.'],
  [{ flaws: { heightNm: 0 } }, 'recipe.flaws.heightNm: 0 is not above 0.'],
  [{ flaws: { edgeShare: 1.5 } }, 'recipe.flaws.edgeShare: 1.5 is above 1.'],
  [{ ground: { order: 2.5 } }, 'recipe.ground.order: 2.5 is not a whole number.'],
  [{ ground: { order: 6 } }, 'recipe.ground.order: 6 is above 5.'],
  [{ ground: { lines: 'yes' } }, 'recipe.ground.lines: "yes" is not a boolean.'],
  [{ band: { factor: '3' } }, 'recipe.band.factor: "3" is not a number.'],
  [{ band: { factor: null } }, 'recipe.band.factor: null is not a number.'],
  [{ stack: { biasV: true } }, 'recipe.stack.biasV: true is not a number.'],
  [{ barrier: { referenceLayers: 0 } }, 'recipe.barrier.referenceLayers: 0 is below 1.'],
  [{ barrier: { model: 'magic' } }, 'recipe.barrier.model: "magic" is not one of wkb, fowler-nordheim, simmons.'],
  [{ scan: { surface: 'both' } }, 'recipe.scan.surface: "both" is not one of barrier, stack.'],
  [{ band: { faktor: 3 } }, 'recipe.band.faktor: is not a setting this version knows; "evenglow recipe" lists them; did you mean factor?'],
  [{ flaws: { heightnm: 1 } }, 'recipe.flaws.heightnm: is not a setting this version knows; "evenglow recipe" lists them; did you mean heightNm?'],
  [{ flaws: { height: 1 } }, 'recipe.flaws.height: is not a setting this version knows; "evenglow recipe" lists them; did you mean heightNm?'],
  [{ band: { heightNm: 1 } }, 'recipe.band.heightNm: is not a setting this version knows; "evenglow recipe" lists them; did you mean flaws.heightNm?'],
  [{ bands: {} }, 'recipe.bands: is not a setting this version knows; "evenglow recipe" lists them; did you mean band?'],
  [{ plan: { marks: [{ mapXUm: 1, mapYUm: 2, chipXUm: 3 }] } }, 'recipe.plan.marks.0.chipYUm: nothing is not a number.'],
  [{ version: 0 }, 'recipe.version: 0 is not one of 1.'],
  [{ corrections: {} }, 'recipe.corrections: {} is not an array.'],
  [{ corrections: [1] }, 'recipe.corrections.0: 1 is not an object.'],
  [{ corrections: [{ kind: 'smear' }] }, 'recipe.corrections.0.kind: "smear" is not one of reclassify, dismiss, merge, split, paint, erase, polygon.'],
  [{ corrections: [{ xUm: 1, yUm: 1 }] }, 'recipe.corrections.0.kind: nothing is not one of reclassify, dismiss, merge, split, paint, erase, polygon.'],
  [{ corrections: [{ kind: 'dismiss', xUm: 1, yUm: 1 }, { kind: 'dismiss', xUm: 1 }] }, 'recipe.corrections.1.yUm: nothing is not a number.'],
  [{ corrections: [{ kind: 'dismiss', xUm: 1, yUm: 1, flaw: 3 }] }, 'recipe.corrections.0.flaw: is not a setting this version knows; "evenglow recipe" lists them.'],
  [{ corrections: [{ kind: 'dismiss', xUm: 1, yUm: 1, radiusUm: 0 }] }, 'recipe.corrections.0.radiusUm: 0 is not above 0.'],
  [{ corrections: [{ kind: 'reclassify', xUm: 1, yUm: 1, cause: 'none' }] }, 'recipe.corrections.0.cause: "none" is not one of bubble, residue, wrinkle, short, open.'],
  [{ corrections: [{ kind: 'reclassify', xUm: 2e6, yUm: 1, cause: 'open' }] }, 'recipe.corrections.0.xUm: 2000000 is above 1000000.'],
  [{ corrections: [{ kind: 'merge', pointsUm: [[1, 2]] }] }, 'recipe.corrections.0.pointsUm: has fewer than 2 entries.'],
  [{ corrections: [{ kind: 'split', pointsUm: [[1, 2], [3]] }] }, 'recipe.corrections.0.pointsUm.1: has fewer than 2 entries.'],
  [{ corrections: [{ kind: 'split', pointsUm: [[1, 2], [3, 4, 5]] }] }, 'recipe.corrections.0.pointsUm.1: has more than 2 entries.'],
  [{ corrections: [{ kind: 'paint', pointsUm: [], widthUm: 1, cause: 'bubble' }] }, 'recipe.corrections.0.pointsUm: has fewer than 1 entries.'],
  [{ corrections: [{ kind: 'paint', pointsUm: [[1, 2]], cause: 'bubble' }] }, 'recipe.corrections.0.widthUm: nothing is not a number.'],
  [{ corrections: [{ kind: 'erase', pointsUm: [['1', 2]], widthUm: 1 }] }, 'recipe.corrections.0.pointsUm.0.0: "1" is not a number.'],
  [{ corrections: [{ kind: 'polygon', pointsUm: [[1, 2], [3, 4]], cause: 'none' }] }, 'recipe.corrections.0.pointsUm: has fewer than 3 entries.'],
  [{ corrections: [{ kind: 'polygon', pointsUm: [[1, 2], [3, 4], [5, 6]] }] }, 'recipe.corrections.0.cause: nothing is not one of bubble, residue, wrinkle, short, open, none.'],
] as const) {
  test(`refused: ${sentence}`, () => {
    const problem = refusal(() => checkRecipe({ ...head, ...changes }));
    assert.equal(problem.code, 'recipe-value');
    assert.equal(problem.message, sentence);
  });
}

test('a section that is no object', () => {
  assert.match(refusal(() => checkRecipe({ ...head, band: 3 })).message, /^recipe\.band: 3 is not a[n]? object\.$/);
  assert.match(refusal(() => checkRecipe({ ...head, band: [] })).message, /^recipe\.band: \[\] is not a[n]? object\.$/);
  assert.match(refusal(() => checkRecipe(undefined)).message, /^recipe: /);
});

test('infinite and missing numbers are refused', () => {
  for (const value of [Number.NaN, Infinity, -Infinity]) assert.match(refusal(() => checkRecipe({ ...head, band: { factor: value } })).message, /^recipe\.band\.factor: /);
});

test('a file of a newer version is refused with both versions', () => {
  const problem = refusal(() => parseRecipe(JSON.stringify({ ...head, version: 2 }), 'mine.json'));
  assert.equal(problem.code, 'recipe-newer');
  assert.equal(problem.message, 'mine.json was written for recipe version 2, this program knows versions up to 1; update Evenglow to open it.');
  // A newer file may hold anything: its version is what is said, not its first unknown key.
  assert.equal(refusal(() => parseRecipe(JSON.stringify({ ...head, version: 7, band: { factor: 0 }, glow: 1 }), 'mine.json')).code, 'recipe-newer');
});

test('not JSON, not a recipe', () => {
  assert.equal(refusal(() => parseRecipe('{', 'mine.json')).code, 'recipe-not-json');
  for (const text of ['[]', 'null', '3', '"evenglow-recipe"', '{}', '{"format":"evenglow-verdict"}']) {
    const problem = refusal(() => parseRecipe(text, 'mine.json'));
    assert.equal(problem.code, 'recipe-format', text);
    assert.match(problem.message, /^mine\.json is not an Evenglow recipe/);
  }
});

test('an empty recipe takes every default of the contract', () => {
  const recipe = defaultRecipe();
  assert.deepEqual(recipe, checkRecipe(head));
  assert.deepEqual(recipe.band, { factor: 3, minNaPerUm2: 0.1, maxNaPerUm2: 30, deviceFieldVPerNm: 0.8, shortMaxUm2: 0.02, terraceMinUm2: 0.25, strayMinUm2: 0, rimUm: 0, shortRimUm: 0 });
  assert.deepEqual(recipe.barrier, { heightEv: 2.5, massRatio: 0.5, layerNm: 0.333, tipAreaNm2: 17, model: 'wkb', prefactor: 'inverse-mass', withinTerrace: 'contact' });
  assert.deepEqual(recipe.stack, { kind: 'one-barrier', targetNaPerUm2: 1, contactOhmUm: 0, offsetV: 0 });
  assert.deepEqual([recipe.scan.biasOn, recipe.scan.surface, recipe.corrections], ['sample', 'barrier', []]);
  assert.deepEqual([recipe.plan.marginUm, recipe.plan.cleaningSpeedUmPerS, recipe.plan.cleaningPitchNm, recipe.plan.successChance], [0.5, 5, 20, 1]);
});

for (let seed = 0; seed < 12; seed++) {
  test(`parse after write is the identity, seed ${seed}`, () => {
    const recipe = randomRecipe(seededRandom(`recipe ${seed}`));
    assert.deepEqual(parseRecipe(JSON.stringify(recipe), 'a.json'), recipe);
    assert.deepEqual(parseRecipe(JSON.stringify(parseRecipe(JSON.stringify(recipe, null, 1), 'a.json')), 'a.json'), recipe);
  });
}

test('settings: numbers, words, flags, with and without "recipe.", the last one wins, the object given is not changed', () => {
  const given = { ...head, band: { factor: 4 } };
  const set = applySettings(given, ['band.factor=5', 'recipe.stack.biasV=-4.5', 'barrier.model=simmons', 'ground.lines=false', 'band.rimUm = 0.2', 'band.factor=6']);
  const recipe = checkRecipe(set);
  assert.deepEqual([recipe.band.factor, recipe.band.rimUm, recipe.stack.biasV, recipe.barrier.model, recipe.ground.lines], [6, 0.2, -4.5, 'simmons', false]);
  assert.deepEqual(given, { ...head, band: { factor: 4 } });
});

test('a setting of none brings the default back', () => {
  const recipe = checkRecipe(applySettings({ ...head, stack: { biasV: 4 }, band: { factor: 9 } }, ['stack.biasV=none', 'band.factor=none', 'barrier.referenceLayers=none']));
  assert.equal(recipe.stack.biasV, undefined);
  assert.equal(recipe.band.factor, 3);
  assert.deepEqual(recipe, defaultRecipe());
});

test('settings that are none are refused', () => {
  for (const setting of ['', '=', 'band.factor', '=3', 'band..factor=3', '.factor=3', 'band.=3', 'band.fac tor=3', 'band[0]=3', 'version.x=1', 'corrections.a=1', 'format.a.b=2']) {
    const problem = refusal(() => applySettings({ ...head, corrections: [] }, [setting]));
    assert.equal(problem.code, 'recipe-setting', setting);
    assert.ok(problem.message.includes(setting));
  }
});

test('settings with wrong values are refused by their path', () => {
  assert.equal(refusal(() => checkRecipe(applySettings(head, ['band.factor=0']))).message, 'recipe.band.factor: 0 is below 1.');
  assert.equal(refusal(() => checkRecipe(applySettings(head, ['band.factor=']))).message, 'recipe.band.factor: "" is not a number.');
  assert.equal(refusal(() => checkRecipe(applySettings(head, ['band.glow=1']))).message, 'recipe.band.glow: is not a setting this version knows; "evenglow recipe" lists them.');
});

test('names of the prototype are refused and change nothing', () => {
  const before = Object.getOwnPropertyNames(Object.prototype).sort();
  for (const text of ['{"__proto__":{"polluted":1}}', '{"constructor":{"prototype":{"polluted":1}}}', '{"band":{"__proto__":{"factor":9}}}', '{"band":{"constructor":1}}', '{"band":{"toString":1}}']) {
    const problem = refusal(() => parseRecipe(text.replace('{', '{"format":"evenglow-recipe","version":1,'), 'a.json'));
    assert.equal(problem.code, 'recipe-value', text);
    assert.match(problem.message, /is not a setting this version knows/);
  }
  for (const setting of ['__proto__.polluted=1', 'band.__proto__.polluted=1', '__proto__=1']) assert.equal(refusal(() => checkRecipe(applySettings(head, [setting]))).code, 'recipe-setting', setting);
  for (const setting of ['constructor.prototype.polluted=1', 'band.constructor=1', 'toString.polluted=1', 'band.hasOwnProperty.polluted=1', 'constructor={"prototype":{"polluted":1}}']) {
    assert.equal(refusal(() => checkRecipe(applySettings(head, [setting]))).code, 'recipe-value', setting);
  }
  for (const setting of ['constructor=none', 'band.toString=none', 'constructor.prototype=none']) applySettings(head, [setting]);
  assert.equal(({} as Record<string, unknown>)['polluted'], undefined);
  assert.equal((Object as unknown as Record<string, unknown>)['polluted'], undefined);
  assert.deepEqual(Object.getOwnPropertyNames(Object.prototype).sort(), before);
  assert.equal(typeof {}.toString, 'function');
});

test('corrections of every kind are taken as they are, in order, also through --set', () => {
  const corrections = [
    { kind: 'reclassify', xUm: 1, yUm: 2, cause: 'residue' }, { kind: 'dismiss', xUm: -1, yUm: 2, radiusUm: 0.1 }, { kind: 'merge', pointsUm: [[1, 2], [3, 4], [5, 6]] },
    { kind: 'split', pointsUm: [[1, 2], [3, 4]] }, { kind: 'paint', pointsUm: [[1, 2]], widthUm: 0.2, cause: 'short' }, { kind: 'erase', pointsUm: [[1, 2], [3, 4]], widthUm: 0.2 },
    { kind: 'polygon', pointsUm: [[0, 0], [1, 0], [0, 1]], cause: 'none' },
  ];
  assert.deepEqual(checkRecipe({ ...head, corrections }).corrections, corrections);
  assert.deepEqual(checkRecipe(applySettings(head, [`corrections=${JSON.stringify(corrections)}`])).corrections, corrections);
  assert.deepEqual(checkRecipe(applySettings({ ...head, corrections }, ['corrections=none'])).corrections, []);
});

test('the JSON Schema describes every kind of correction and each of its fields', () => {
  type Field = { const?: string; title?: string; description?: string };
  const schema = recipeJsonSchema() as unknown as { properties: { corrections: { items: { oneOf: { description?: string; additionalProperties?: boolean; properties: Record<string, Field> }[] } } } };
  const kinds = schema.properties.corrections.items.oneOf;
  assert.deepEqual(kinds.map(({ properties }) => properties['kind']?.const), ['reclassify', 'dismiss', 'merge', 'split', 'paint', 'erase', 'polygon']);
  for (const { description, additionalProperties, properties } of kinds) {
    assert.ok(description);
    assert.equal(additionalProperties, false);
    for (const [name, field] of Object.entries(properties)) assert.ok(name === 'kind' || field.description, name);
  }
});

/** The paths of the contract, section by section. */
const contract: Record<string, string> = {
  scan: 'channel widthUm heightUm biasV biasOn surface heightUnit currentUnit flipX flipY saturationA floorA centreXUm centreYUm rotationDeg slowUp',
  barrier: 'heightEv massRatio layerNm tipAreaNm2 referenceLayers model withinTerrace',
  stack: 'kind biasV targetNaPerUm2 emitterSheetOhm injectorSheetOhm contactOhmUm offsetV',
  band: 'factor minNaPerUm2 maxNaPerUm2 shortMaxUm2 terraceMinUm2 strayMinUm2 rimUm shortRimUm',
  plan: 'requiredUm2 siteWidthUm siteHeightUm siteCount marginUm cleaningSpeedUmPerS cleaningPitchNm successChance marks',
};

test('the JSON Schema lists every path of the contract, with defaults and a description', () => {
  const schema = recipeJsonSchema() as { properties: Record<string, { properties?: Record<string, { default?: unknown; description?: string }>; additionalProperties?: boolean }>; additionalProperties?: boolean };
  assert.equal(schema.additionalProperties, false);
  for (const name of ['format', 'version', 'corrections', ...Object.keys(sections)]) assert.ok(schema.properties[name], name);
  const recipe = defaultRecipe() as unknown as Record<string, Record<string, unknown>>;
  for (const [name, paths] of Object.entries(contract)) {
    const section = schema.properties[name]!;
    assert.equal(section.additionalProperties, false, name);
    for (const path of paths.split(' ')) {
      const field = section.properties?.[path];
      assert.ok(field, `${name}.${path}`);
      assert.ok((field.description ?? '').length > 10, `${name}.${path} has no description`);
      assert.deepEqual(field.default, recipe[name]![path], `default of ${name}.${path}`);
    }
  }
  for (const [name, { properties }] of Object.entries(schema.properties)) {
    for (const [path, field] of Object.entries(properties ?? {})) assert.ok(field.description, `${name}.${path}`);
  }
});

test('--set reaches every path of every section', () => {
  for (const [name, section] of Object.entries(sections)) {
    for (const key of Object.keys(section.shape)) {
      const set = applySettings(head, [`${name}.${key}=7`]) as Record<string, Record<string, unknown>>;
      assert.equal(set[name]?.[key], 7, `${name}.${key}`);
    }
  }
});

test('a recipe saved by version 1 still opens and says what it said', () => {
  const text = readFileSync(new URL('../fixtures/recipes/version-1.json', import.meta.url), 'utf8');
  const { version: _, ...saved } = JSON.parse(text) as Record<string, unknown>;
  const opened = parseRecipe(text, 'version-1.json') as unknown as Record<string, Record<string, unknown>>;
  for (const name of Object.keys(sections)) {
    for (const [key, value] of Object.entries(saved[name] as Record<string, unknown>)) assert.deepEqual(opened[name]?.[key], value, `${name}.${key}`);
  }
});
