import { readFileSync, statSync } from 'node:fs';
import { extname, join, resolve, sep } from 'node:path';
import type { Request, RequestHandler, Response } from 'express';
import { nonceOf } from './security-headers.js';

const NONCE_MARK = '__CSP_NONCE__';
const ENCODINGS = [
  { token: 'br', ending: '.br' },
  { token: 'gzip', ending: '.gz' },
] as const;

/**
 * Serves the built web application: hashed assets for a year and precompressed where the build left a twin, and the
 * page itself for every other address, never stored, with a fresh nonce in it.
 */
export function webApp(folder: string): RequestHandler {
  const root = resolve(folder);
  return (request, response, next) => {
    if (request.method !== 'GET' && request.method !== 'HEAD') return next();
    if (request.path === '/api' || request.path.startsWith('/api/')) return next();
    const file = fileOf(root, request.path);
    if (file) return sendAsset(file, request, response);
    // An asset of an older build is gone; the page in its place would be taken for a script.
    const isPage = request.path === '/index.html' || extname(request.path) === '';
    if (!isPage || request.path.startsWith('/assets/')) return next();
    sendPage(root, response, next);
  };
}

function fileOf(root: string, path: string): string | null {
  let decoded: string;
  try {
    decoded = decodeURIComponent(path);
  } catch {
    return null;
  }
  if (decoded.includes('\0') || decoded === '/' || decoded === '/index.html') return null;
  const file = resolve(join(root, decoded));
  if (!file.startsWith(root + sep)) return null;
  return statSync(file, { throwIfNoEntry: false })?.isFile() ? file : null;
}

function sendAsset(file: string, request: Request, response: Response): void {
  const hashed = file.includes(`${sep}assets${sep}`);
  response.setHeader(
    'Cache-Control',
    hashed ? 'public, max-age=31536000, immutable' : 'public, max-age=3600',
  );
  response.vary('Accept-Encoding');
  response.type(extname(file));
  for (const { token, ending } of ENCODINGS) {
    if (!request.acceptsEncodings(token)) continue;
    if (!statSync(file + ending, { throwIfNoEntry: false })?.isFile()) continue;
    response.setHeader('Content-Encoding', token);
    response.sendFile(file + ending, {
      cacheControl: false,
      headers: { 'Content-Type': response.get('Content-Type') },
    });
    return;
  }
  response.sendFile(file, { cacheControl: false });
}

function sendPage(root: string, response: Response, next: () => void): void {
  let page: string;
  try {
    page = readFileSync(join(root, 'index.html'), 'utf8');
  } catch {
    return next();
  }
  response.setHeader('Cache-Control', 'no-store');
  response.type('html').send(page.replaceAll(NONCE_MARK, nonceOf(response)));
}
