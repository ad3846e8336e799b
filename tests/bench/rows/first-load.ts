import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';

import { absent, atMost, type Row } from '../measure';

const CLIENT = join('dist', 'client');
const NAME = 'first load: script that the start page names, gzip';
const KILOBYTES = 200;

/** Size of what a first visit fetches as script before anything is asked for: entry and its preloads. */
export function firstLoadRows(): Row[] {
  const page = join(CLIENT, 'index.html');
  if (!existsSync(page))
    return [absent(NAME, 'not built; run npm run build first', `at most ${KILOBYTES} kB`)];
  const html = readFileSync(page, 'utf8');
  const scripts = new Set(
    [...html.matchAll(/(?:src|href)="\/?([^"]+\.js)"/g)].map((match) => match[1] ?? ''),
  );
  let bytes = 0;
  for (const script of scripts) bytes += gzipSync(readFileSync(join(CLIENT, script))).length;
  return [atMost(NAME, bytes / 1000, KILOBYTES, (value) => `${Number(value.toPrecision(4))} kB`)];
}
