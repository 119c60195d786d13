/**
 * The most memory that a whole process holds while it solves one large problem: the command line in a child process,
 * as a night run has it, nothing warmed up.
 */
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { lpFolder } from './lp-folder';
import { inMilliseconds, table } from './timing';

const problems = ['pilot87', 'dfl001'];
const figure = 300;
const command = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..', 'dist', 'planrow.mjs');
/** Runs in the child before the command: tells at its end what the system has counted, in kilobytes. */
const tellPeak =
  'data:text/javascript,process.on("exit",()=>process.stderr.write(`\\npeak ${process.resourceUsage().maxRSS}\\n`))';

/** A section of the report; '' where the shared folder is missing. */
export function measureMemory(): string {
  if (!existsSync(lpFolder)) return '';
  const rows = problems.map((name) => {
    const file = path.join(lpFolder, 'netlib', `${name}.mps.gz`);
    const { stdout, stderr } = spawnSync(
      process.execPath,
      ['--import', tellPeak, command, 'solve', file, '--json'],
      { encoding: 'utf8', maxBuffer: 2 ** 28 },
    );
    const peak = /\npeak (\d+)/.exec(stderr);
    if (peak === null) throw new Error(`${name}: the child told no peak: ${stderr}`);
    const { status, iterations, seconds } = JSON.parse(stdout) as {
      status: string;
      iterations: number;
      seconds: { solve: number; total: number };
    };
    process.stderr.write(`memory on ${name}\n`);
    return [
      name,
      (Number(peak[1]) / 1024).toFixed(0),
      status,
      String(iterations),
      inMilliseconds(1000 * seconds.solve),
      inMilliseconds(1000 * seconds.total),
    ];
  });
  return [
    '## Memory',
    '',
    `\`planrow solve FILE --json\` in a process of its own, from start to end; figure to reach: ${figure} MB.`,
    '',
    table(['problem', 'peak resident MB', 'end', 'iterations', 'solve ms', 'total ms'], rows),
  ].join('\n');
}
