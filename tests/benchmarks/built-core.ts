/**
 * The solver core as it is shipped, from dist/, which `npm run bench` builds first.
 */
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import type * as core from '#solver-core';

const file = path.resolve(
  path.dirname(fileURLToPath(import.meta.url)),
  '..',
  '..',
  'dist',
  'solver-core.mjs',
);

export type SolverCore = typeof core;

export async function loadBuiltCore(): Promise<SolverCore> {
  return (await import(pathToFileURL(file).href)) as SolverCore;
}
