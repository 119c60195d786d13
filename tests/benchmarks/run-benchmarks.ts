/**
 * Times what design says figures for, and writes tests/benchmarks/RESULTS.md.
 *
 *     npm run bench                      all of it
 *     npm run bench -- --only afiro,plan one or several problems or parts (reading, plan, memory, netlib, kennington)
 *     npm run bench -- --dry             prints without writing RESULTS.md
 *
 * Our solve and HiGHS (WebAssembly, simplex, its presolve on) run in this one process, turn and turn about, on the
 * same problem, reading left out; `--no-liftoff` lets WebAssembly start at its full speed. Given are the median of the
 * rounds and the least of them; ratios are of the least, which others on the machine disturb least. Every answer is
 * checked against the value to test against. Where the time goes is written by hand, in where-the-time-goes.md.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { cpus, loadavg, totalmem } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { measureMemory } from './measure-memory';
import { measureReading } from './measure-reading';
import { measureSheetPlans } from './measure-sheet-plans';
import { measureProblemSet } from './measure-problem-sets';

const parts = ['reading', 'plan', 'memory', 'netlib', 'kennington'];
const folder = path.dirname(fileURLToPath(import.meta.url));

async function main(): Promise<void> {
  const only = argument('--only')?.split(',');
  const wants = (part: string): boolean => only === undefined || only.includes(part);
  const names = only?.filter((word) => !parts.includes(word)) ?? [];
  const sections: string[] = [];
  if (wants('reading')) sections.push(await measureReading());
  if (wants('plan')) sections.push(await measureSheetPlans());
  if (wants('memory')) sections.push(measureMemory());
  for (const set of ['netlib', 'kennington'] as const) {
    if (wants(set) || names.length > 0) {
      sections.push(await measureProblemSet(set, wants(set) ? undefined : names));
    }
  }
  if (only === undefined)
    sections.push(readFileSync(path.join(folder, 'where-the-time-goes.md'), 'utf8').trimEnd());
  const report = [
    '# Benchmark results',
    '',
    `${new Date().toISOString().slice(0, 10)}, ${machine()}. Made by \`npm run bench\`; its head tells how.`,
    '',
    sections.filter((section) => section !== '').join('\n\n'),
    '',
  ].join('\n');
  process.stdout.write(`\n${report}`);
  if (only === undefined && !process.argv.includes('--dry')) {
    writeFileSync(path.join(folder, 'RESULTS.md'), report);
  }
}

function machine(): string {
  const load = loadavg().map((average) => average.toFixed(1));
  const gigabytes = Math.round(totalmem() / 2 ** 30);
  return `${cpus().length} shared cores (${cpus()[0].model}), ${gigabytes} GB, Node ${process.version}, load averages at the end ${load.join(', ')} (of which 1 is this run’s own)`;
}

function argument(name: string): string | undefined {
  const at = process.argv.indexOf(name);
  return at < 0 ? undefined : process.argv[at + 1];
}

await main();
