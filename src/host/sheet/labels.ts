// Names, for those who hear the page, of the sheet's controls that show only a picture.

const NAMES: [selector: string, name: string][] = [
  ['[data-u-comp="defined-name"] input', 'Selected cell'],
  ['[data-u-comp="formula-bar"] [data-u-comp="defined-name"] a', 'Names of the workbook'],
  ['[data-u-comp="sheet-bar-append-button"]', 'Add a sheet'],
  ['[data-u-comp="sheet-bar-append-button"] ~ [data-u-comp="sheet-bar-append-button"]', 'All sheets'],
  ['header button', 'Stop computing'],
];

/** Names each control as soon as it is there, and again where the sheet draws it anew. */
export function nameControls(container: HTMLElement): void {
  const page = container.ownerDocument;
  const name = () => {
    for (const [selector, label] of NAMES) container.querySelectorAll(selector).forEach((control) => control.setAttribute('aria-label', label));
    // While nobody edits, the editors stand outside the sheet.
    page.querySelectorAll('[data-u-comp="editor"]').forEach((editor) => editor.setAttribute('aria-label', 'Content of the cell'));
  };
  new MutationObserver(name).observe(container, { childList: true, subtree: true });
}
