/** Serves the built page: a small static server, and finding a free port for it. */
import { createReadStream } from 'node:fs';
import { realpath, stat } from 'node:fs/promises';
import { createServer } from 'node:http';
import type { IncomingMessage, Server, ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join, sep } from 'node:path';
import { pipeline } from 'node:stream';
import { headersFor, protections } from './headers.ts';

const firstPort = 8317;
const portsTried = 50;
const parentWatchMs = 500;

/** A server of the files below `folder`, for GET and HEAD; `/` is index.html. Not yet listening. */
export function pageServer(folder: string): Server {
  return createServer((request, response) => {
    answer(folder, request, response).catch(() => {
      if (response.headersSent) response.destroy();
      else refuse(response, 500, 'The file could not be read.');
    });
  });
}

async function answer(folder: string, request: IncomingMessage, response: ServerResponse): Promise<void> {
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    response.setHeader('Allow', 'GET, HEAD');
    return refuse(response, 405, 'Only GET and HEAD are answered.');
  }
  const path = pathOf(request.url ?? '/');
  if (path === undefined) return refuse(response, 400, 'The address cannot be read.');
  const file = await fileBelow(folder, path);
  if (file === undefined) return refuse(response, 404, 'There is no such file.');
  response.writeHead(200, { ...headersFor(path), 'Content-Length': String(file.bytes) });
  if (request.method === 'HEAD') {
    response.end();
    return;
  }
  pipeline(createReadStream(file.name), response, () => {});
}

/** The decoded path of a request, `/` resolved to the page; undefined when it is malformed. */
function pathOf(url: string): string | undefined {
  try {
    const path = decodeURIComponent(url.replace(/[?#].*$/s, ''));
    if (!path.startsWith('/') || path.includes('\0') || path.includes('\\')) return undefined;
    return path === '/' ? '/index.html' : path;
  } catch {
    return undefined;
  }
}

/** The regular file at `path` when it truly lies below `folder`, links followed. */
async function fileBelow(folder: string, path: string): Promise<{ name: string; bytes: number } | undefined> {
  try {
    const top = await realpath(folder);
    const name = await realpath(join(top, path));
    if (!name.startsWith(top + sep)) return undefined;
    const facts = await stat(name);
    return facts.isFile() ? { name, bytes: facts.size } : undefined;
  } catch {
    return undefined;
  }
}

function refuse(response: ServerResponse, status: number, sentence: string): void {
  response.writeHead(status, { 'Content-Type': 'text/plain; charset=utf-8', 'Cache-Control': 'no-store', ...protections('/') });
  response.end(`${sentence}\n`);
}

/**
 * Listens on `port`, or on the next free one; `say` is told of each that is busy.
 * @returns the address to open, such as `http://127.0.0.1:8317/`
 * @throws Error with a sentence when no port of the range is free, or the address cannot be used
 */
export async function listenFrom(server: Server, host: string, port: number, say: (line: string) => void): Promise<string> {
  const last = Math.min(port + portsTried - 1, 65535);
  for (let candidate = port; candidate <= last; candidate++) {
    const problem = await tryToListen(server, host, candidate);
    if (problem === undefined) return addressOf(server, host);
    if (problem !== 'EADDRINUSE') {
      throw new Error(`Cannot serve on ${host}, port ${candidate} (${problem}); choose others with HOST and PORT.`);
    }
    say(candidate < last ? `Port ${candidate} is busy, trying ${candidate + 1}.` : `Port ${candidate} is busy.`);
  }
  throw new Error(`The ports ${port} to ${last} of ${host} are all busy; choose another with PORT.`);
}

/** Undefined when listening, else the system's error code. */
function tryToListen(server: Server, host: string, port: number): Promise<string | undefined> {
  return new Promise((resolve) => {
    const failed = (error: NodeJS.ErrnoException): void => resolve(error.code ?? error.message);
    server.once('error', failed);
    server.listen(port, host, () => {
      server.off('error', failed);
      resolve(undefined);
    });
  });
}

function addressOf(server: Server, host: string): string {
  const { port } = server.address() as AddressInfo;
  return `http://${host.includes(':') ? `[${host}]` : host}:${port}/`;
}

/** The port to begin with: PORT, or our own. @throws Error with a sentence when PORT is no port */
export function portFrom(text: string | undefined): number {
  if (text === undefined || text === '') return firstPort;
  if (!/^\d{1,5}$/.test(text) || Number(text) > 65535) {
    throw new Error(`PORT is "${text}", which is no port; give a whole number from 0 (any free one) to 65535.`);
  }
  return Number(text);
}

function say(line: string): void {
  process.stdout.write(`${line}\n`);
}

/** Serves `folder` until Ctrl-C. HOST and PORT of `env` are honoured. */
export async function serveUntilStopped(folder: string, env: NodeJS.ProcessEnv): Promise<void> {
  const server = pageServer(folder);
  try {
    const address = await listenFrom(server, env['HOST'] || '127.0.0.1', portFrom(env['PORT']), say);
    say(`Evenglow is at ${address} (Ctrl-C ends it)`);
  } catch (error) {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
    return;
  }
  const stop = (): void => {
    server.close();
    server.closeAllConnections();
  };
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, stop);
  if (env['npm_lifecycle_event'] === 'start') whenParentEnds(stop);
}

/** npm, ended by another program, passes that on to its shell only, which leaves us running with the port taken. */
function whenParentEnds(act: () => void): void {
  const parent = process.ppid;
  const watch = setInterval(() => {
    if (process.ppid === parent) return;
    clearInterval(watch);
    act();
  }, parentWatchMs).unref();
}
