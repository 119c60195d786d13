/**
 * Composition root of the task pane: waits for the spreadsheet program, builds the adapters and puts the pane into
 * its page.
 */
import { connectExcel, whenExcelIsReady } from '../adapters/excel-host/excel-spreadsheet-host';
import { browserPlanEngine } from '../adapters/solver-thread/browser-plan-engine';
import { paneTexts } from '../wording/pane-texts';
import { mountPane } from './mount-pane';
import { startCommandOf } from './start-command';

const millisecondsPerDay = 86_400_000;
/** 30 December 1899: day 0 of the count from 1900. */
const dayZero = Date.UTC(1899, 11, 30);

async function start(element: Element): Promise<void> {
  if (!(await whenExcelIsReady())) {
    element.textContent = paneTexts.outsideHost;
    return;
  }
  mountPane(
    element,
    {
      host: connectExcel(),
      engine: browserPlanEngine(),
      today: () => {
        const now = new Date();
        return (now.getTime() - now.getTimezoneOffset() * 60_000 - dayZero) / millisecondsPerDay;
      },
      repeat: (milliseconds, action) => {
        const timer = setInterval(action, milliseconds);
        return () => clearInterval(timer);
      },
    },
    startCommandOf(location.search),
  );
}

const pane = document.getElementById('pane');
if (pane !== null) {
  void start(pane);
}
