/**
 * The running pane: holds the state, feeds events to the update, hands commands to the effects, tells the view.
 */
import { PaneEffects, type PaneSurroundings } from './pane-effects';
import type { PaneEvent } from './pane-events';
import { initialState, type PaneState, type StartCommand } from './pane-state';
import { updatePane } from './pane-update';

export class PaneProgram {
  private current: PaneState = initialState;
  private readonly listeners = new Set<() => void>();
  private readonly effects: PaneEffects;

  constructor(surroundings: PaneSurroundings) {
    this.effects = new PaneEffects(surroundings, this.dispatch);
  }

  start(command: StartCommand): void {
    this.dispatch({ kind: 'started', command });
    void this.effects.watch();
  }

  readonly state = (): PaneState => this.current;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  readonly dispatch = (event: PaneEvent): void => {
    const { state, commands } = updatePane(this.current, event);
    const isChanged = state !== this.current;
    this.current = state;
    if (isChanged) {
      this.listeners.forEach((listener) => listener());
    }
    commands.forEach((command) => void this.effects.perform(command));
  };
}
