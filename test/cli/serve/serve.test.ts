/** The page's server: what it hands out, under which headers, and on which port. */
import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { request } from 'node:http';
import type { IncomingHttpHeaders, Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, describe, test } from 'node:test';
import { securityPolicy } from '../../../src/cli/serve/headers.ts';
import { listenFrom, pageServer, portFrom } from '../../../src/cli/serve/serve.ts';

const silent = (): void => {};

describe('the page’s server', () => {
  let top = '';
  let server: Server;

  before(async () => {
    top = mkdtempSync(join(tmpdir(), 'evenglow-test-'));
    mkdirSync(join(top, 'dist/assets'), { recursive: true });
    mkdirSync(join(top, 'dist-other'));
    writeFileSync(join(top, 'secret.txt'), 'secret');
    writeFileSync(join(top, 'dist-other/secret.txt'), 'secret');
    writeFileSync(join(top, 'dist/index.html'), '<!doctype html><title>page</title>');
    writeFileSync(join(top, 'dist/assets/main-1a2b.js'), 'export {};');
    writeFileSync(join(top, 'dist/assets/compute.worker-3c4d.js'), 'export {};');
    writeFileSync(join(top, 'dist/assets/kernels-5e6f.wasm'), Uint8Array.of(0, 0x61, 0x73, 0x6d));
    writeFileSync(join(top, 'dist/two words.txt'), 'two');
    symlinkSync(join(top, 'secret.txt'), join(top, 'dist/link.txt'));
    server = pageServer(join(top, 'dist'));
    await listenFrom(server, '127.0.0.1', 0, silent);
  });
  after(() => {
    server.close();
    rmSync(top, { recursive: true });
  });

  // By hand: fetch() would tidy `..` away before it is sent.
  function ask(path: string, method = 'GET'): Promise<{ status: number; headers: IncomingHttpHeaders; body: string }> {
    const { port } = server.address() as AddressInfo;
    return new Promise((resolve, reject) => {
      request({ host: '127.0.0.1', port, path, method, agent: false }, (response) => {
        let body = '';
        response.setEncoding('utf8').on('data', (part: string) => { body += part; }).on('end', () => {
          resolve({ status: response.statusCode ?? 0, headers: response.headers, body });
        });
      }).on('error', reject).end();
    });
  }

  test('hands out the page at the root, to be asked for again each time', async () => {
    const { status, headers, body } = await ask('/?x=1');
    assert.equal(status, 200);
    assert.equal(headers['content-type'], 'text/html; charset=utf-8');
    assert.equal(headers['cache-control'], 'no-cache');
    assert.match(body, /<title>page/);
  });

  test('names types rightly and lets hashed files be kept for good', async () => {
    const script = await ask('/assets/main-1a2b.js');
    assert.equal(script.headers['content-type'], 'text/javascript; charset=utf-8');
    assert.equal(script.headers['cache-control'], 'public, max-age=31536000, immutable');
    assert.equal((await ask('/assets/kernels-5e6f.wasm')).headers['content-type'], 'application/wasm');
    assert.equal((await ask('/two%20words.txt')).body, 'two');
  });

  test('answers HEAD without a body and refuses other methods', async () => {
    const head = await ask('/', 'HEAD');
    assert.deepEqual([head.status, head.body, head.headers['content-length']], [200, '', '34']);
    const post = await ask('/', 'POST');
    assert.deepEqual([post.status, post.headers.allow], [405, 'GET, HEAD']);
  });

  test('puts protection on every answer, errors too', async () => {
    for (const path of ['/', '/assets/main-1a2b.js', '/none', '/%zz']) {
      const { headers } = await ask(path);
      assert.equal(headers['x-content-type-options'], 'nosniff', path);
      assert.match(String(headers['content-security-policy']), /^default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; style-src 'self'; /, path);
      assert.match(String(headers['content-security-policy']), /frame-ancestors 'none'$/, path);
    }
  });

  test('lets only a worker’s script make code from text', async () => {
    assert.match(String((await ask('/assets/compute.worker-3c4d.js')).headers['content-security-policy']), /script-src 'self' 'wasm-unsafe-eval' 'unsafe-eval';/);
    for (const path of ['/', '/assets/main-1a2b.js', '/worker.js', '/assets/worker/page.js', '/assets/worker.html']) {
      assert.doesNotMatch(securityPolicy(path), /'unsafe-eval'/, path);
      assert.doesNotMatch(securityPolicy(path), /unsafe-inline/, path);
    }
  });

  for (const path of ['/../secret.txt', '/..%2fsecret.txt', '/%2e%2e/secret.txt', '/assets/../../secret.txt', '/../dist-other/secret.txt', '/link.txt', '/assets', '/assets/', '/none.js', '//etc/passwd']) {
    test(`finds nothing at ${path}`, async () => {
      const { status, body } = await ask(path);
      assert.deepEqual([status, body], [404, 'There is no such file.\n']);
    });
  }

  for (const path of ['/%zz', '/a%00b', '/..%5csecret.txt']) {
    test(`cannot read ${path}`, async () => assert.equal((await ask(path)).status, 400));
  }

  test('moves on from a busy port and says so', async () => {
    const { port } = server.address() as AddressInfo;
    const second = pageServer(join(top, 'dist'));
    const said: string[] = [];
    try {
      const address = await listenFrom(second, '127.0.0.1', port, (line) => said.push(line));
      const taken = (second.address() as AddressInfo).port;
      assert.ok(taken > port);
      assert.equal(address, `http://127.0.0.1:${taken}/`);
      assert.equal(said[0], `Port ${port} is busy, trying ${port + 1}.`);
      assert.equal(said.length, taken - port);
    } finally {
      second.close();
    }
  });

  test('says in a sentence that an address cannot be used', async () => {
    await assert.rejects(listenFrom(pageServer(top), '192.0.2.1', 8317, silent), /^Error: Cannot serve on 192\.0\.2\.1, port 8317 \(EADDRNOTAVAIL\); choose others with HOST and PORT\.$/);
  });
});

describe('PORT', () => {
  test('is read as a whole number, with one of our own when absent', () => {
    assert.deepEqual([portFrom('0'), portFrom('3000'), portFrom('65535')], [0, 3000, 65535]);
    assert.equal(portFrom(undefined), portFrom(''));
  });
  for (const text of ['65536', '-1', '80.5', 'http', '1e3', ' 80']) {
    test(`refuses "${text}"`, () => assert.throws(() => portFrom(text), /is no port; give a whole number from 0/));
  }
});
