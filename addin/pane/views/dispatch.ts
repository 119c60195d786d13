/** What a view does with a press: it tells the program. */
import type { PaneEvent } from '../pane-events';

export type Dispatch = (event: PaneEvent) => void;
