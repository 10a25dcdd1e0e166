// Names, for those who hear the page, of the sheet's controls that show only a picture.

const NAMES: [selector: string, name: string][] = [
  ['[data-u-comp="defined-name"] input', 'Selected cell'],
  ['[data-u-comp="formula-bar"] [data-u-comp="defined-name"] a', 'Names of the workbook'],
  ['[data-u-comp="sheet-bar-append-button"]', 'Add a sheet'],
  ['[data-u-comp="sheet-bar-append-button"] ~ [data-u-comp="sheet-bar-append-button"]', 'All sheets'],
  ['[data-u-comp="editor"]', 'Content of the cell'],
];

/** Names each control as soon as it is there, and again where the sheet draws it anew. */
export function nameControls(container: HTMLElement): void {
  const name = () => {
    for (const [selector, label] of NAMES) {
      for (const control of container.querySelectorAll(selector)) control.setAttribute('aria-label', label);
    }
  };
  new MutationObserver(name).observe(container, { childList: true, subtree: true });
}
