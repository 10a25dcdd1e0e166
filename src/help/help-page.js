// The function reference as one page of HTML, made from functions.json at build time. No script, nothing loaded: it reads on its own.

/**
 * @param {{ functions: { id: string, description: string, parameters: { name: string, description: string, optional?: boolean }[] }[] }} metadata functions.json
 * @param {string} version of the add-in
 * @returns {string} the page; each function stands under the anchor of its id
 */
export function helpPage({ functions }, version) {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Foldplan functions</title>
<link rel="icon" href="assets/icon-32.png">
<style>${STYLE}</style>
</head>
<body>
<header>
<h1>Foldplan functions</h1>
<p>Where frequencies land after sampling, and which sample rates are usable. All frequencies of one call share one unit, whichever it is. Version ${escape(version)}.</p>
</header>
<nav aria-label="Functions"><ul>
${functions.map(({ id }) => `<li><a href="#${escape(id)}">${escape(id)}</a></li>`).join('\n')}
</ul></nav>
<main>
${functions.map(section).join('\n')}
<section id="arguments">
<h2>What arguments may be</h2>
<p>Functions that give one result a row take a cell or a whole column for every argument; one cell serves every row. A blank row stays blank, and an error stays in its row. Functions that list rows spill a table under a header row.</p>
<p>Numbers are read as the decimals of up to 15 digits that the sheet shows, computed on exactly, and rounded once at the end. At real sampling the zones are counted from 1 and even ones are inverted; at IQ sampling zone 0 lies around 0 and none is inverted. A frequency on a zone edge counts to the zone above, and a band may touch an edge.</p>
<p>A wrong argument gives <code>#VALUE!</code>, and a question without an answer <code>#N/A</code>, each with a sentence that names the argument, shows the value and says what is accepted.</p>
</section>
</main>
</body>
</html>
`;
}

const section = ({ id, description, parameters }) => `<section id="${escape(id)}">
<h2><code>${escape(signature(id, parameters))}</code></h2>
<p>${escape(description)}</p>
<dl>
${parameters.map((parameter) => `<dt>${escape(parameter.name)}${parameter.optional ? ' <span>optional</span>' : ''}</dt><dd>${escape(parameter.description)}</dd>`).join('\n')}
</dl>
</section>`;

const signature = (id, parameters) => `FOLD.${id}(${parameters.map(({ name, optional }) => (optional ? `[${name}]` : name)).join(', ')})`;

const escape = (text) => text.replace(/[&<>"]/g, (character) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[character]);

const STYLE = `
:root { color-scheme: light dark; --ink: #22303c; --soft: #5d6b78; --paper: #fbfbf9; --line: #d9dedf; --link: #0b6470; }
@media (prefers-color-scheme: dark) { :root { --ink: #dfe6ea; --soft: #9eabb5; --paper: #161b20; --line: #333d46; --link: #6cc3cd; } }
* { box-sizing: border-box; }
body { margin: 0 auto; max-width: 52rem; padding: 1.5rem 1rem 4rem; background: var(--paper); color: var(--ink); font: 16px/1.5 "Segoe UI", system-ui, sans-serif; }
a { color: var(--link); }
h1 { margin: 0; font-size: 1.6rem; }
h2 { margin: 0 0 .4rem; font-size: 1rem; overflow-wrap: anywhere; }
nav ul { display: flex; flex-wrap: wrap; gap: .3rem 1rem; padding: 0; list-style: none; }
section { padding: 1.2rem 0; border-top: 1px solid var(--line); scroll-margin-top: 1rem; }
section:target h2 { text-decoration: underline; text-decoration-thickness: 2px; text-underline-offset: 4px; }
code { font-family: ui-monospace, Consolas, monospace; }
dl { display: grid; grid-template-columns: minmax(6rem, max-content) 1fr; gap: .25rem 1.2rem; margin: .6rem 0 0; }
dt { font-weight: 600; }
dt span { color: var(--soft); font-size: .8rem; font-weight: 400; }
dd { margin: 0; }
p { margin: .4rem 0; }
@media (max-width: 30rem) { dl { grid-template-columns: 1fr; } dd { margin-bottom: .4rem; } }
`;
