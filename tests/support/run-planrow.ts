/**
 * Runs the built command line as a planner's shell would, in a folder of its own.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { checkoutFolder } from './needs';

const program = path.join(checkoutFolder, 'dist', 'planrow.mjs');

export interface PlanrowEnd {
  readonly exitCode: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** A folder for one test file's workbooks; removed when its tests are done. */
export class WorkFolder {
  readonly path = mkdtempSync(path.join(tmpdir(), 'planrow-test-'));

  /** @returns the file's name, to be given to `run` */
  write(name: string, content: Uint8Array | string): string {
    writeFileSync(path.join(this.path, name), content);
    return name;
  }

  read(name: string): Buffer {
    return readFileSync(path.join(this.path, name));
  }

  /** All files, hidden ones too, so that nothing left behind goes unseen. */
  list(): string[] {
    return readdirSync(this.path).sort();
  }

  remove(): void {
    rmSync(this.path, { recursive: true, force: true });
  }

  /** @throws Error where the program is not built */
  run(...words: readonly string[]): PlanrowEnd {
    if (!existsSync(program)) {
      throw new Error('dist/planrow.mjs is missing: run npm run build first.');
    }
    const { status, stdout, stderr } = spawnSync(process.execPath, [program, ...words], {
      cwd: this.path,
      encoding: 'utf8',
      maxBuffer: 1 << 28,
    });
    return { exitCode: status, stdout, stderr };
  }

  /** Runs with --json and reads the one object that must stand on standard output. */
  runJson(...words: readonly string[]): PlanrowEnd & { readonly json: Record<string, unknown> } {
    const end = this.run(...words, '--json');
    return { ...end, json: JSON.parse(end.stdout) as Record<string, unknown> };
  }
}
