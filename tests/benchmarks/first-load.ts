import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';

interface Chunk {
  file: string;
  css?: string[];
  imports?: string[];
}
type Manifest = Record<string, Chunk>;

/** Bytes, gzipped, of the scripts and of the style sheets that a page needs before it can be used. */
export function firstLoad(dist: string, page: string): { scripts: number; styles: number } {
  const file = path.join(dist, '.vite', 'manifest.json');
  if (!existsSync(file)) throw new Error('The client is not built. Run npm run build.');
  const manifest = JSON.parse(readFileSync(file, 'utf8')) as Manifest;
  const chunks = [...withImports(manifest, ['index.html', page])].map((name) => chunkOf(manifest, name));
  const weigh = (files: readonly string[]) =>
    [...new Set(files)].reduce((sum, each) => sum + gzipSync(readFileSync(path.join(dist, each))).length, 0);
  return {
    scripts: weigh(chunks.map((chunk) => chunk.file)),
    styles: weigh(chunks.flatMap(({ css = [] }) => css)),
  };
}

function withImports(manifest: Manifest, names: readonly string[], found = new Set<string>()): Set<string> {
  for (const name of names.filter((each) => !found.has(each))) {
    found.add(name);
    withImports(manifest, chunkOf(manifest, name).imports ?? [], found);
  }
  return found;
}

function chunkOf(manifest: Manifest, name: string): Chunk {
  const chunk = manifest[name];
  if (!chunk) throw new Error(`The build has no ${name}.`);
  return chunk;
}
