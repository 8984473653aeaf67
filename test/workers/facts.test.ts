import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { causes } from '../../src/ledger/ledger.ts';
import { checkRecipe } from '../../src/recipe/parse-recipe.ts';
import { factsOf } from '../../workers/facts.ts';
import { thisApp } from '../../workers/this-app.ts';

const facts = factsOf(thisApp);

describe('facts', () => {
  it('name the program as package.json does', () => {
    const { name, version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as typeof thisApp;
    assert.deepEqual(facts.app, { name, version });
  });

  it('give every cause its look, in the order of the codes', () => {
    assert.deepEqual(facts.causes.map(({ code, cause }) => [code, cause]), causes.map((cause, code) => [code, cause]));
    assert.deepEqual(facts.causes[3], { code: 3, cause: 'bubble', fill: '#56b4e9', ink: '#0b4f7d', hatch: 'dots', hatchPath: facts.causes[3]!.hatchPath, hatchStroke: 0 });
    assert.ok(facts.causes.every(({ hatch, hatchPath }) => (hatch === 'none') === (hatchPath === '')));
  });

  it('carry the scale from dark blue to yellow', () => {
    assert.equal(facts.scale.length, 256);
    assert.deepEqual([facts.scale[0], facts.scale[255]], ['#00224e', '#fee838']);
  });

  it('describe fields of every kind', () => {
    const field = (path: string) => facts.fields.find((candidate) => candidate.path === path);
    assert.deepEqual(field('band.factor'), {
      path: 'band.factor', kind: 'number', title: 'Band factor', description: field('band.factor')!.description, min: 1, max: 1e6, fallback: 3,
    });
    assert.deepEqual([field('ground.order')!.integer, field('ground.order')!.min, field('ground.order')!.max], [true, 0, 5]);
    assert.deepEqual([field('scan.channel')!.kind, field('scan.channel')!.choices, field('scan.channel')!.fallback], ['choice', ['height', 'current'], undefined]);
    assert.deepEqual([field('ground.wear')!.kind, field('ground.wear')!.fallback], ['flag', true]);
    assert.equal(field('stack.biasV')!.absent, 'proposed: where the reference carries the target density');
    assert.equal(new Set(facts.fields.map(({ path }) => path)).size, facts.fields.length);
  });

  it('cover every value of the default recipe', () => {
    const paths = new Set(facts.fields.map(({ path }) => path));
    for (const [section, values] of Object.entries(facts.defaultRecipe)) {
      if (typeof values !== 'object' || values === null || Array.isArray(values)) continue;
      for (const [key, value] of Object.entries(values)) {
        // Lists, such as the spots of ground, have no single value to show.
        if (Array.isArray(value)) continue;
        assert.ok(paths.has(`${section}.${key}`), `${section}.${key}`);
        assert.deepEqual(facts.fields.find(({ path }) => path === `${section}.${key}`)!.fallback, value);
      }
    }
    assert.doesNotThrow(() => checkRecipe(facts.defaultRecipe));
  });
});
