/**
 * Patterns as criteria and look-ups take them: `*` any text, `?` any character, `~` before one of them the character
 * itself. Case does not count; the whole text must fit.
 */
const patterns = new Map<string, RegExp>();
/** Patterns kept for the next call; a sheet full of different ones starts anew. */
const maximumKept = 1000;

export function patternOf(text: string): RegExp {
  let pattern = patterns.get(text);
  if (pattern === undefined) {
    if (patterns.size >= maximumKept) {
      patterns.clear();
    }
    pattern = new RegExp(`^${patternSource(text)}$`, 'isu');
    patterns.set(text, pattern);
  }
  return pattern;
}

export function hasWildcards(text: string): boolean {
  return /[*?~]/.test(text);
}

function patternSource(text: string): string {
  return text.replace(/~([*?~])|([*?])|[\\^$.|+()[\]{}/~]/g, (all, escaped?: string, wildcard?: string) => {
    if (escaped !== undefined) {
      return escaped === '~' ? '~' : `\\${escaped}`;
    }
    if (wildcard !== undefined) {
      return wildcard === '*' ? '.*' : '.';
    }
    return all === '~' ? '~' : `\\${all}`;
  });
}
