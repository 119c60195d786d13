/**
 * What the button that opened the pane asked for. Each button opens the pane's page with its own query; the manifest's
 * test holds that every query stands here.
 */
import type { StartCommand } from './pane-state';

/** @param query of the page's address, with or without `?` */
export function startCommandOf(query: string): StartCommand {
  const start = new URLSearchParams(query).get('start');
  return start === 'solve' || start === 'put-back' ? start : 'open';
}
