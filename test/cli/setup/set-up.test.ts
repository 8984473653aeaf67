/** Setting a fresh clone up: which Node, which packages, which browser. */
import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, describe, test } from 'node:test';
import { findBrowser } from '../../../src/cli/setup/browser.mjs';
import { nodeTooOld } from '../../../src/cli/setup/node-version.mjs';
import { lockIsInstalled, packagesAreThere } from '../../../src/cli/setup/packages.mjs';
import { projectRoot } from '../../../src/cli/setup/set-up.mjs';

describe('the version of Node', () => {
  for (const version of ['20.19.0', 'v20.20.2', '22.12.0', '23.0.0', '24.1.0', '100.0.0']) {
    test(`${version} will do`, () => assert.equal(nodeTooOld(version), undefined));
  }
  for (const version of ['18.20.0', '20.0.0', '20.18.3', '21.7.0', '22.11.0', '9.0.0']) {
    test(`${version} is refused in a sentence`, () => {
      assert.match(nodeTooOld(version) ?? '', new RegExp(`^Evenglow needs Node 20\\.19 .*; this is Node ${version}\\. Install`));
    });
  }
  test('package.json says the same', () => {
    const { engines } = JSON.parse(readFileSync(join(projectRoot, 'package.json'), 'utf8')) as { engines: { node: string } };
    assert.equal(engines.node, '^20.19.0 || >=22.12.0');
  });
});

describe('installed packages', () => {
  const lock = JSON.stringify({ packages: { '': {}, 'node_modules/a': { version: '1.0.0' }, 'node_modules/b': { version: '2.0.0', optional: true } } });

  test('are complete without the optional ones', () => {
    assert.equal(lockIsInstalled(lock, JSON.stringify({ packages: { 'node_modules/a': { version: '1.0.0' } } })), true);
  });
  test('are not when one has another version, is missing, or nothing is recorded', () => {
    assert.equal(lockIsInstalled(lock, JSON.stringify({ packages: { 'node_modules/a': { version: '1.0.1' } } })), false);
    assert.equal(lockIsInstalled(lock, JSON.stringify({ packages: {} })), false);
    assert.equal(lockIsInstalled(lock, ''), false);
  });

  describe('in a folder', () => {
    let folder = '';
    before(() => { folder = mkdtempSync(join(tmpdir(), 'evenglow-test-')); });
    after(() => rmSync(folder, { recursive: true }));

    test('are recognised from npm’s record, then from the stamp, until the lock changes', () => {
      writeFileSync(join(folder, 'package-lock.json'), lock);
      assert.equal(packagesAreThere(folder), false);
      const record = join(folder, 'node_modules/.package-lock.json');
      mkdirSync(join(folder, 'node_modules'));
      writeFileSync(record, JSON.stringify({ packages: { 'node_modules/a': { version: '1.0.0' } } }));
      assert.equal(packagesAreThere(folder), true);
      rmSync(record);
      assert.equal(packagesAreThere(folder), true);
      writeFileSync(join(folder, 'package-lock.json'), lock.replace('1.0.0', '1.0.1'));
      assert.equal(packagesAreThere(folder), false);
    });
  });
});

describe('the browser for the tests', () => {
  test('is the one that CHROME_PATH names', () => {
    assert.equal(findBrowser({ CHROME_PATH: process.execPath }, 'linux'), process.execPath);
  });
  test('is refused in a sentence when CHROME_PATH names no program', () => {
    assert.throws(() => findBrowser({ CHROME_PATH: join(projectRoot, 'package.json') }, 'linux'), { name: 'SetUpError', message: /^CHROME_PATH is .*package\.json, where there is no program; point it/ });
  });
  test('is looked for on the search path', () => {
    const folder = mkdtempSync(join(tmpdir(), 'evenglow-test-'));
    try {
      writeFileSync(join(folder, 'chromium'), '#!/bin/sh\n', { mode: 0o755 });
      assert.equal(findBrowser({ PATH: `${join(folder, 'nowhere')}:${folder}` }, 'aix'), join(folder, 'chromium'));
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
  test('may be missing', () => {
    assert.equal(findBrowser({ PATH: join(projectRoot, 'test') }, 'aix'), undefined);
  });
});
