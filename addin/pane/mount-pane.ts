/**
 * Puts the pane into a page: the program behind it, and the views before it.
 */
import { createElement } from 'react';
import { createRoot } from 'react-dom/client';
import type { PaneSurroundings } from './pane-effects';
import { PaneProgram } from './pane-program';
import type { StartCommand } from './pane-state';
import { PlanrowPane } from './PlanrowPane';

export function mountPane(element: Element, surroundings: PaneSurroundings, command: StartCommand): void {
  const program = new PaneProgram(surroundings);
  createRoot(element).render(createElement(PlanrowPane, { program, isHostDark: surroundings.host.isDark() }));
  program.start(command);
  const stop = program.subscribe(() => {
    if (program.state().workbook !== null) {
      stop();
      // Seen in the browser's own timeline: from here on a press is accepted.
      requestAnimationFrame(() => performance.mark('usable'));
    }
  });
}
