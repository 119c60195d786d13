/**
 * Composition root of the task pane. The page says what it is and where the work is done; the views that read,
 * solve and write from within the spreadsheet program will hang on here.
 */
const pane = document.getElementById('pane');
if (pane !== null) {
  const note = document.createElement('p');
  note.textContent = 'Plans are solved by the command line for now: planrow solve FILE.xlsx';
  pane.append(note);
}
