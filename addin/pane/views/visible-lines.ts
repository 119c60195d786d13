/**
 * Which lines of a long table are drawn: those in sight and a few around them. Pure, so that it can be tested.
 */

export interface LineWindow {
  readonly first: number;
  /** One past the last. */
  readonly end: number;
}

/** Lines drawn beyond both edges, so that a quick scroll shows no gap. */
const margin = 6;

/** @param scrollTop pixels of the body above the edge; may be negative while a touch pulls beyond it */
export function visibleLines(
  scrollTop: number,
  viewHeight: number,
  lineHeight: number,
  count: number,
): LineWindow {
  const top = Math.max(0, scrollTop);
  const first = Math.max(0, Math.floor(top / lineHeight) - margin);
  const end = Math.min(count, Math.ceil((top + viewHeight) / lineHeight) + margin);
  return { first: Math.min(first, Math.max(0, end - 1)), end };
}

/** Where to scroll so that a line is whole in sight below a fixed heading. */
export function scrollToLine(
  line: number,
  scrollTop: number,
  viewHeight: number,
  lineHeight: number,
): number {
  const top = line * lineHeight;
  if (top < scrollTop) {
    return top;
  }
  return top + lineHeight > scrollTop + viewHeight ? top + lineHeight - viewHeight : scrollTop;
}
