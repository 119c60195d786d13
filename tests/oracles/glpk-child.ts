/**
 * Solves a list of problems with glpk.js in a process of its own: the package is an ES module that asks for its own
 * address, which jest's loader cannot give it. Reads JSON from standard input, writes JSON to standard output.
 */
import { readFileSync } from 'node:fs';
import type { LP } from 'glpk.js/node';
import loadGlpk from 'glpk.js/node';
import type { GlpkAnswer } from './glpk-reference';

async function main(): Promise<void> {
  const problems = JSON.parse(readFileSync(0, 'utf8')) as readonly LP[];
  const glpk = await loadGlpk();
  const answers = problems.map((problem): GlpkAnswer => {
    const { status, z } = glpk.solve(problem, { msglev: glpk.GLP_MSG_OFF, presol: false, tmlim: 1 }).result;
    switch (status) {
      case glpk.GLP_OPT:
        return { status: 'optimal', objective: z };
      case glpk.GLP_NOFEAS:
        return { status: 'infeasible', objective: 0 };
      case glpk.GLP_UNBND:
        return { status: 'unbounded', objective: 0 };
      default:
        return { status: 'unknown', objective: 0 };
    }
  });
  process.stdout.write(JSON.stringify(answers));
}

void main();
