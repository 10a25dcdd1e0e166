// The pane inside the spreadsheet program. functions.js, loaded by the same page, has registered the worksheet functions by now.

import { OfficeHost } from './host/office/office-host';
import { isDark } from './host/office/theme';
import { mountPane } from './pane';

/** Put in by the build. */
declare const FOLDPLAN_VERSION: string;

const root = document.getElementById('pane')!;

if (typeof Office === 'undefined') {
  tell('Office.js did not load, so the pane cannot reach the spreadsheet. Check the connection to its address, or use a build that carries its own copy.');
} else {
  void Office.onReady(async ({ host }) => {
    const dark = isDark(Office.context.officeTheme);
    if (dark !== null) root.dataset.theme = dark ? 'dark' : 'light';
    if (host === Office.HostType.Excel) await mountPane(new OfficeHost(), root, FOLDPLAN_VERSION);
    else tell('This page is the pane of the Foldplan add-in: it works inside a spreadsheet program. Without one, open workbench.html of this site.');
  });
}

function tell(sentence: string): void {
  const paragraph = document.createElement('p');
  paragraph.setAttribute('role', 'alert');
  paragraph.textContent = sentence;
  root.replaceChildren(paragraph);
}
