/** The headers each answer of the page's server carries. */

/** Content type by the file name's ending; what is not listed is sent as plain bytes. */
const contentTypes: Readonly<Record<string, string>> = {
  css: 'text/css; charset=utf-8',
  csv: 'text/csv; charset=utf-8',
  html: 'text/html; charset=utf-8',
  ico: 'image/x-icon',
  jpg: 'image/jpeg',
  js: 'text/javascript; charset=utf-8',
  json: 'application/json; charset=utf-8',
  map: 'application/json; charset=utf-8',
  mjs: 'text/javascript; charset=utf-8',
  png: 'image/png',
  svg: 'image/svg+xml; charset=utf-8',
  tif: 'image/tiff',
  txt: 'text/plain; charset=utf-8',
  wasm: 'application/wasm',
  webmanifest: 'application/manifest+json; charset=utf-8',
  woff2: 'font/woff2',
};

/** Content type of a path such as `/assets/main-AbC.js`. */
export function contentType(path: string): string {
  return contentTypes[path.slice(path.lastIndexOf('.') + 1).toLowerCase()] ?? 'application/octet-stream';
}

/**
 * The content-security policy for a path. Only a worker's script may compile text to code
 * (the array library does that): a worker is governed by the policy of its own script's answer.
 */
export function securityPolicy(path: string): string {
  const scripts = isWorkerScript(path) ? "'self' 'wasm-unsafe-eval' 'unsafe-eval'" : "'self' 'wasm-unsafe-eval'";
  return [
    "default-src 'none'",
    `script-src ${scripts}`,
    "style-src 'self'",
    "img-src 'self' blob: data:",
    "connect-src 'self'",
    "worker-src 'self'",
    "font-src 'self'",
    "manifest-src 'self'",
    "base-uri 'none'",
    "form-action 'none'",
    "frame-ancestors 'none'",
  ].join('; ');
}

function isWorkerScript(path: string): boolean {
  return /^\/assets\/[^/]*worker[^/]*\.js$/.test(path);
}

/** All headers of a good answer for a path. Files in assets/ carry a hash in their name and never change. */
export function headersFor(path: string): Record<string, string> {
  return {
    'Content-Type': contentType(path),
    'Cache-Control': path.startsWith('/assets/') ? 'public, max-age=31536000, immutable' : 'no-cache',
    ...protections(path),
  };
}

/** The headers that every answer carries, errors too. */
export function protections(path: string): Record<string, string> {
  return {
    'Content-Security-Policy': securityPolicy(path),
    'X-Content-Type-Options': 'nosniff',
    'Referrer-Policy': 'no-referrer',
    'Cross-Origin-Opener-Policy': 'same-origin',
    'Cross-Origin-Resource-Policy': 'same-origin',
  };
}
