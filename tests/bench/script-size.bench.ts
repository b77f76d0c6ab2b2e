import { readdirSync, readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { report } from './report.ts';

// Script a browser fetches before it can draw the first page: what index.html names and preloads.
const folder = new URL('../../dist/client/', import.meta.url);
const page = readFileSync(new URL('index.html', folder), 'utf8');
const named = [...page.matchAll(/(?:src|href)="\/(assets\/[^"]+\.js)"/g)].map(
  (match) => match[1] ?? '',
);
const sizeOf = (name: string) => gzipSync(readFileSync(new URL(name, folder))).byteLength;
report({
  name: 'script of the first load, gzipped',
  value: named.reduce((sum, name) => sum + sizeOf(name), 0) / 1000,
  unit: 'kB',
  limit: { max: 250 },
});
const all = readdirSync(new URL('assets/', folder)).filter((name) => name.endsWith('.js'));
report({
  name: 'script of all pages together, gzipped',
  value: all.reduce((sum, name) => sum + sizeOf(`assets/${name}`), 0) / 1000,
  unit: 'kB',
});
