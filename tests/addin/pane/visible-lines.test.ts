/** Which lines of a long table are drawn, and where it scrolls: worked out by hand for lines of 40 in a view of 200. */
import { scrollToLine, visibleLines } from '../../../addin/pane/views/visible-lines';

it.each([
  ['at the top', 0, 1000, { first: 0, end: 11 }],
  ['in the middle', 4000, 1000, { first: 94, end: 111 }],
  ['at the end', 39_800, 1000, { first: 989, end: 1000 }],
  ['pulled beyond the top', -50, 1000, { first: 0, end: 11 }],
  ['scrolled farther than a filtered table is long', 4000, 3, { first: 2, end: 3 }],
  ['without lines', 0, 0, { first: 0, end: 0 }],
])('draws the lines in sight and six around them: %s', (_where, scrollTop, count, lines) => {
  expect(visibleLines(scrollTop, 200, 40, count)).toEqual(lines);
});

it('scrolls only as far as it must to show a line whole', () => {
  expect(scrollToLine(3, 0, 200, 40)).toBe(0);
  expect(scrollToLine(5, 0, 200, 40)).toBe(40);
  expect(scrollToLine(1, 100, 200, 40)).toBe(40);
});
