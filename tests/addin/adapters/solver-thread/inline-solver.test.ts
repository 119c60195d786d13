/**
 * The solver on this thread: slices, progress, stop. Time is made up by the test.
 */
import { LinearProgramBuilder, InvalidProblemError, type LinearProgram, type Progress } from '#solver-core';
import { InlineSolver } from '../../../../addin/adapters/solver-thread/inline-solver';

/** A transport problem of `size` × `size`: long enough for several slices where they are short. */
function transport(size: number): LinearProgram {
  const builder = new LinearProgramBuilder({ name: 'transport', sense: 'minimise' });
  for (let end = 0; end < 2 * size; end++) {
    builder.addRow({ lower: 10, upper: 10 });
  }
  for (let from = 0; from < size; from++) {
    for (let to = 0; to < size; to++) {
      const column = builder.addColumn({ cost: ((from * 7 + to * 13) % 17) + 1 });
      builder.addEntry(from, column, 1);
      builder.addEntry(size + to, column, 1);
    }
  }
  return builder.build();
}

/** A host whose every slice seems to take so many milliseconds. */
function host(millisecondsPerLook: number) {
  const seen = { pauses: 0 };
  let now = 0;
  const solver = new InlineSolver({
    now: () => (now += millisecondsPerLook),
    pause: () => {
      seen.pauses++;
      return Promise.resolve();
    },
  });
  return { solver, seen };
}

it('A small problem is solved in one slice', async () => {
  const { solver, seen } = host(1);
  const builder = new LinearProgramBuilder({ sense: 'maximise' });
  builder.addColumn({ cost: 1, upper: 3 });
  const result = await solver.start(builder.build(), {}).result;
  expect(result).toMatchObject({ status: 'optimal', objective: 3 });
  expect(seen.pauses).toBe(0);
});

it('A longer one gives way between slices, reports progress, and ends with the same answer', async () => {
  const slow = host(4000);
  const progress: Progress[] = [];
  const problem = transport(40);
  const sliced = await slow.solver.start(problem, {}, (step) => progress.push(step)).result;
  const whole = await host(0).solver.start(problem, {}).result;
  expect(sliced.status).toBe('optimal');
  expect(sliced).toEqual(whole);
  expect(slow.seen.pauses).toBeGreaterThan(1);
  expect(progress).toHaveLength(slow.seen.pauses);
});

it('A solve that is stopped at once ends as stopped, before any work', async () => {
  const running = host(1).solver.start(transport(10), {});
  running.stop();
  expect(await running.result).toMatchObject({ status: 'stopped', cause: 'caller', iterations: 0 });
});

it('A solve that is stopped between slices ends as stopped', async () => {
  const running = host(4000).solver.start(transport(40), {}, () => running.stop());
  expect(await running.result).toMatchObject({ status: 'stopped', cause: 'caller' });
});

it('A problem that cannot be solved as stated rejects, and stopping after the end does nothing', async () => {
  const { solver } = host(1);
  const builder = new LinearProgramBuilder({ sense: 'minimise' });
  builder.addColumn({ isInteger: true });
  await expect(solver.start(builder.build(), {}).result).rejects.toThrow(InvalidProblemError);
  const running = solver.start(builder.build(), { relax: true });
  expect((await running.result).status).toBe('optimal');
  running.stop();
  expect((await running.result).status).toBe('optimal');
});
