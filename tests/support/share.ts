/**
 * Long seeded suites run a first share of their cases in `npm test` and all of them in `npm run prove`.
 * PLANROW_SHARE is a number from 0 to 1, or `all`; the default is 0.02.
 */
const defaultShare = 0.02;

/** How many of a suite's cases run: its share rounded up, and never fewer than `atLeast`. */
export function shareOf(total: number, atLeast: number): number {
  return Math.min(total, Math.max(atLeast, Math.ceil(total * readShare(process.env.PLANROW_SHARE))));
}

function readShare(stated: string | undefined): number {
  if (stated === undefined || stated === '') {
    return defaultShare;
  }
  const share = stated === 'all' ? 1 : Number(stated);
  if (!(share > 0 && share <= 1)) {
    throw new Error(`PLANROW_SHARE must be a number from 0 to 1, or all; it is "${stated}".`);
  }
  return share;
}
