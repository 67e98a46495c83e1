import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { BenchRow } from './bench-row.js';

/** What Vite's manifest says of one chunk; keys are sources, `_`-keys are shared chunks. */
interface Chunk {
  file: string;
  imports?: string[];
  dynamicImports?: string[];
}
type Manifest = Record<string, Chunk>;

const FRONTEND = resolve(__dirname, '../../frontend');
const ENTRY = 'index.html';
const LAYOUTS = { antd: 'src/app/antd-scope.tsx', vessel: 'src/pages/vessels/vessel-layout.page.tsx' };
/** Fetched only when a person asks for the working to be computed again. */
const ON_REQUEST = /mathjs/;
const ICONS_KB = 10;

/** JavaScript a browser fetches for the first page and for the heaviest route, gzip as a server sends it. */
export const webSizeRow: BenchRow = {
  values: [
    {
      name: 'initialKB',
      what: 'JavaScript of the first page, gzip, KB of 1,000 bytes',
      better: 'lower',
      reach: 220,
      ambition: 140,
    },
    {
      name: 'largestRouteKB',
      what: 'JavaScript of the heaviest route, charts included',
      better: 'lower',
      reach: 330,
      ambition: null,
    },
  ],
  run() {
    const folder = mkdtempSync(join(tmpdir(), 'stayledger-web-size-'));
    try {
      const vite = resolve(__dirname, '../../node_modules/vite/bin/vite.js');
      const into = ['--outDir', folder, '--manifest', 'manifest.json', '--logLevel', 'error'];
      execFileSync(process.execPath, [vite, 'build', ...into], { cwd: FRONTEND });
      return sizes(folder, JSON.parse(readFileSync(join(folder, 'manifest.json'), 'utf8')) as Manifest);
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  },
};

function sizes(folder: string, manifest: Manifest): Record<string, number> {
  const sizeOf = new Map<string, number>();
  const kilobytes = (keys: Iterable<string>) => {
    let bytes = 0;
    for (const file of new Set([...keys].map((key) => manifest[key].file))) {
      if (!sizeOf.has(file))
        sizeOf.set(file, gzipSync(readFileSync(join(folder, file)), { level: 9 }).length);
      bytes += sizeOf.get(file) ?? 0;
    }
    return bytes / 1000;
  };
  const first = closure(manifest, [ENTRY]);
  const antd = [...closure(manifest, [LAYOUTS.antd])].filter((key) => !first.has(key));
  const pages = Object.keys(manifest).filter((key) => key.endsWith('.page.tsx'));
  if (pages.length < 10)
    throw new Error(`only ${pages.length} pages in the manifest: the routes are not split`);
  const routes = pages.map((page) => {
    const own = closure(manifest, [page]);
    // What a page shows by itself after it has loaded, such as a chart, belongs to its weight.
    const later = [...own].flatMap((key) => (first.has(key) ? [] : (manifest[key].dynamicImports ?? [])));
    const fetched = closure(manifest, [
      ENTRY,
      page,
      LAYOUTS.vessel,
      ...later.filter((key) => !ON_REQUEST.test(key)),
    ]);
    // Icons share a small chunk with antd; only a page that holds antd's large ones stands below its layout.
    if (kilobytes(antd.filter((key) => own.has(key))) > ICONS_KB) antd.forEach((key) => fetched.add(key));
    return kilobytes(fetched);
  });
  return { initialKB: kilobytes(first), largestRouteKB: Math.max(...routes) };
}

/** The chunks that come with these: what they import, and what that imports. */
function closure(manifest: Manifest, keys: string[]): Set<string> {
  const found = new Set<string>();
  const visit = (key: string) => {
    if (found.has(key)) return;
    found.add(key);
    manifest[key].imports?.forEach(visit);
  };
  keys.forEach(visit);
  return found;
}
