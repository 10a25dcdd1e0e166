// The page around sheet and pane: its bar, its line of news, and the ways in which a user hands it a file.

export interface Page {
  sheet: HTMLElement;
  pane: HTMLElement;
  /** The workbook's file name, and whether it holds changes that no file has. */
  nameFile(name: string, unsaved: boolean): void;
  /** Says what happened. */
  tell(sentence: string): void;
  /** Says what went wrong. */
  complain(sentence: string): void;
  /** The selected cell: what screen readers say of it, and for everyone the sentence behind its error, where it has one. */
  showCell(spoken: string, error: string | null): void;
  /** While something takes its time, nothing can be opened or saved. `giveUp` is offered to the user where something can be given up. */
  busy(on: boolean, giveUp?: () => void): void;
  /** Asks before changes are lost; resolves to whether they may be. */
  mayDiscard(question: string): Promise<boolean>;
  /** Hands a file to the user. */
  download(name: string, content: Blob): void;
}

export interface Actions {
  open(file: File): void;
  save(): void;
  savePlain(): void;
  /** Whether leaving the page would lose something. */
  unsaved(): boolean;
}

export function workbenchPage(document: Document, actions: Actions): Page {
  const byId = <T extends HTMLElement>(id: string) => document.getElementById(id) as T;
  const [openButton, saveButton, savePlainButton, cancelButton] = ['open', 'save', 'save-plain', 'cancel']
    .map((id) => byId<HTMLButtonElement>(id)) as [HTMLButtonElement, HTMLButtonElement, HTMLButtonElement, HTMLButtonElement];
  const [status, cellError] = [byId('status'), byId('cell-error')];
  const [sheet, pane] = [byId('sheet'), byId('pane')];

  takeFiles(document, byId<HTMLInputElement>('chosen-file'), byId('drop-hint'), openButton, (file) => actions.open(file));
  saveButton.addEventListener('click', () => actions.save());
  savePlainButton.addEventListener('click', () => actions.savePlain());
  let giveUp: (() => void) | undefined;
  cancelButton.addEventListener('click', () => giveUp?.());
  takeKeys(document, [openButton, sheet, pane], () => openButton.click(), () => saveButton.click());
  document.defaultView!.addEventListener('beforeunload', (event) => {
    if (actions.unsaved()) event.preventDefault();
  });

  const say = (kind: 'news' | 'fault', sentence: string) => {
    status.dataset.kind = kind;
    status.textContent = sentence;
  };

  return {
    sheet,
    pane,
    nameFile(name, unsaved) {
      byId('file-name').textContent = unsaved ? `${name}, changed` : name;
      document.title = `${unsaved ? '• ' : ''}${name} – Foldplan workbench`;
    },
    tell: (sentence) => say('news', sentence),
    complain: (sentence) => say('fault', sentence),
    showCell(spoken, error) {
      renew(byId('cell'), spoken);
      renew(cellError, error ?? '');
    },
    busy(on, how) {
      const focused = [savePlainButton, cancelButton].some((button) => button === document.activeElement);
      giveUp = how;
      cancelButton.hidden = !how;
      savePlainButton.hidden = Boolean(how);
      for (const button of [openButton, saveButton, savePlainButton]) button.disabled = on;
      if (focused) (how ? cancelButton : savePlainButton).focus();
    },
    mayDiscard(question) {
      const dialog = byId<HTMLDialogElement>('discard');
      byId('discard-question').textContent = question;
      dialog.returnValue = 'keep';
      dialog.showModal();
      return new Promise((answer) => dialog.addEventListener('close', () => answer(dialog.returnValue === 'discard'), { once: true }));
    },
    download(name, content) {
      const link = document.createElement('a');
      link.href = URL.createObjectURL(content);
      link.download = name;
      link.click();
      setTimeout(() => URL.revokeObjectURL(link.href), 60_000);
    },
  };
}

/** The same text again would be said again. */
function renew(element: HTMLElement, text: string): void {
  if (element.textContent !== text) element.textContent = text;
}

/** A file comes from the dialog behind the button, or is dropped anywhere on the page. */
function takeFiles(document: Document, input: HTMLInputElement, hint: HTMLElement, button: HTMLButtonElement, open: (file: File) => void): void {
  button.addEventListener('click', () => input.click());
  input.addEventListener('change', () => {
    const file = input.files?.[0];
    input.value = ''; // so that the same file can be chosen again
    if (file) open(file);
  });

  const carriesFile = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
  const capture = { capture: true }; // before the sheet sees it
  document.addEventListener('dragover', (event) => {
    if (!carriesFile(event)) return;
    event.preventDefault();
    hint.hidden = false;
  }, capture);
  document.addEventListener('dragleave', (event) => {
    if (event.relatedTarget === null) hint.hidden = true;
  }, capture);
  document.addEventListener('drop', (event) => {
    if (!carriesFile(event)) return;
    event.preventDefault();
    event.stopPropagation();
    hint.hidden = true;
    const file = event.dataTransfer?.files[0];
    if (file && !button.disabled) open(file);
  }, capture);
}

/** Ctrl+O and Ctrl+S, and F6 from part to part: in the sheet, Tab goes from cell to cell. */
function takeKeys(document: Document, parts: HTMLElement[], open: () => void, save: () => void): void {
  document.addEventListener('keydown', (event) => {
    const command = (event.ctrlKey || event.metaKey) && !event.shiftKey && !event.altKey;
    const action = command && event.key.toLowerCase() === 'o' ? open : command && event.key.toLowerCase() === 's' ? save : null;
    if (action) action();
    else if (event.key === 'F6') goOn(document, parts, event.shiftKey ? -1 : 1);
    else return;
    event.preventDefault();
    event.stopPropagation();
  }, { capture: true });
}

function goOn(document: Document, parts: HTMLElement[], step: 1 | -1): void {
  const here = parts.findIndex((part) => part.contains(document.activeElement));
  const next = parts[(Math.max(here, 0) + step + parts.length) % parts.length]!;
  // The sheet listens to the keyboard through an input of its own.
  (next.querySelector<HTMLElement>('[contenteditable="true"]') ?? next).focus();
}
