import { RenewalPolicy } from '../../../solver-core/factorization/renewal-policy';

/** Updates until the policy speaks, when iteration k costs `cost(k)`; undefined within 500. */
function updatesUntilDue(factorization: number, cost: (update: number) => number): number | undefined {
  const policy = new RenewalPolicy();
  policy.noteFactorization(factorization, 0);
  for (let update = 1; update <= 500; update++) {
    policy.noteUpdate(cost(update));
    if (policy.isDue) return update;
  }
  return undefined;
}

test('iterations of constant cost never ask for new factors', () => {
  expect(updatesUntilDue(1000, () => 50)).toBeUndefined();
});

test('the faster iterations become dearer, the sooner new factors are due', () => {
  const slow = updatesUntilDue(1000, (update) => 100 + update)!;
  const fast = updatesUntilDue(1000, (update) => 100 + 20 * update)!;
  expect(fast).toBeLessThan(slow);
});

test('dear factors are kept longer than cheap ones', () => {
  const cheap = updatesUntilDue(100, (update) => 100 + 5 * update)!;
  const dear = updatesUntilDue(10_000, (update) => 100 + 5 * update)!;
  expect(cheap).toBeLessThan(dear);
});

test('with costs that grow by g an update the average is least near √(2 F / g), by hand', () => {
  // (F + Σ (b + g k)) / n is least at n = √(2 F / g); F counts twelvefold. The smoothed cost lags a few updates behind.
  const best = Math.sqrt((2 * 12 * 2000) / 10);
  const due = updatesUntilDue(2000, (update) => 300 + 10 * update)!;
  expect(due).toBeGreaterThan(best - 1);
  expect(due).toBeLessThan(best + 8);
});

test('a new factorization starts the count again', () => {
  const policy = new RenewalPolicy();
  policy.noteFactorization(1, 0);
  for (let update = 1; update <= 20; update++) policy.noteUpdate(update * 100);
  expect(policy.isDue).toBe(true);
  policy.noteFactorization(1, 0);
  expect(policy.isDue).toBe(false);
});
