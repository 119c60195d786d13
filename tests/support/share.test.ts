import { shareOf } from './share';

describe('the share of a long suite', () => {
  const stated = process.env.PLANROW_SHARE;
  afterEach(() => {
    if (stated === undefined) delete process.env.PLANROW_SHARE;
    else process.env.PLANROW_SHARE = stated;
  });

  it('is 2 of 100 unless stated otherwise, and never fewer than asked for', () => {
    delete process.env.PLANROW_SHARE;
    expect(shareOf(10_000, 1)).toBe(200);
    expect(shareOf(49, 40)).toBe(40);
    expect(shareOf(3, 40)).toBe(3);
  });

  it('is all of it when stated so, and any part between', () => {
    process.env.PLANROW_SHARE = 'all';
    expect(shareOf(10_000, 1)).toBe(10_000);
    process.env.PLANROW_SHARE = '0.5';
    expect(shareOf(99, 1)).toBe(50);
  });

  it('is an error when stated wrongly', () => {
    for (const wrong of ['most', '0', '-1', '2']) {
      process.env.PLANROW_SHARE = wrong;
      expect(() => shareOf(10, 1)).toThrow(/PLANROW_SHARE/);
    }
  });
});
