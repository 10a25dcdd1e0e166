// The colours that the spreadsheet program shows itself in, which need not be those of the system.

/** Whether a theme is dark, by the ground that it gives (`#262626`); null where the program tells of none. */
export function isDark(theme: Pick<Office.OfficeTheme, 'bodyBackgroundColor'> | undefined): boolean | null {
  const [, ...parts] = /^#?([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(theme?.bodyBackgroundColor ?? '') ?? [];
  if (parts.length === 0) return null;
  const [red, green, blue] = parts.map((part) => parseInt(part, 16)) as [number, number, number];
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue < 128; // the weights of ITU-R BT.709
}
