// The layer rule: a file in src/ imports only from its own folder or from the floors below it (docs/architecture.md).
// Also: nerdamer and algebrite are imported in src/cas only, and no source file has more than 450 lines.
import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

const src = join(dirname(fileURLToPath(import.meta.url)), '../src');
/** Ground floor first; a folder may import those named after it. */
const FLOORS = {
  algebra: [],
  notation: ['algebra'],
  tensor: ['algebra', 'notation'],
  geometry: ['algebra', 'notation', 'tensor'],
  mechanics: ['algebra', 'geometry'],
  scalartensor: ['algebra', 'notation', 'geometry', 'mechanics'],
  cas: ['algebra'],
  '.': ['algebra', 'notation', 'tensor', 'geometry', 'mechanics', 'scalartensor', 'cas'],
  compare: ['algebra', 'notation', 'geometry', 'mechanics', '.'],
  emit: ['algebra', 'notation', 'tensor', 'geometry', 'mechanics', 'scalartensor', 'cas', '.', 'compare'],
  cli: ['algebra', 'notation', 'tensor', 'geometry', 'mechanics', 'scalartensor', 'cas', '.', 'compare', 'emit'],
};
/** Files at the top of src that stand above everything. */
const ROOF = new Set(['index.ts', 'bin.ts']);
const faults = [];
const files = readdirSync(src, { recursive: true }).filter((f) => f.endsWith('.ts'));
for (const file of files) {
  const text = readFileSync(join(src, file), 'utf8');
  const folder = file.includes('/') ? file.split('/')[0] : '.';
  if (!(folder in FLOORS)) faults.push(`src/${file}: the folder '${folder}' has no floor in .tools/layers.mjs`);
  const lines = text.split('\n').length;
  if (lines > 450) faults.push(`src/${file}: ${lines} lines; is it one noun?`);
  for (const [, target] of text.matchAll(/(?:from|import)\s*\(?\s*'([^']+)'/g)) {
    if (/^(nerdamer|algebrite)/.test(target) && folder !== 'cas')
      faults.push(`src/${file}: only src/cas may import ${target}`);
    if (!target.startsWith('.') || ROOF.has(file)) continue;
    const there = relative(src, resolve(join(src, dirname(file)), target));
    const floor = there.includes('/') ? there.split('/')[0] : '.';
    if (floor !== folder && !FLOORS[folder]?.includes(floor)) faults.push(`src/${file}: must not import ${target}`);
  }
}
for (const fault of faults) console.error(fault);
console.log(`layers: ${files.length} files, ${faults.length} faults`);
process.exit(faults.length > 0 ? 1 : 0);
