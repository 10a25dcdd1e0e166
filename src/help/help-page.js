// The function reference as one page of HTML, made from functions.json and the sources at build time. It reads on its own; its one script,
// search.js, adds a field to search in.

/**
 * @param {{ functions: { id: string, description: string, parameters: Parameter[] }[] }} metadata functions.json
 * @param {{ family: string, functions: Map<string, import('./sources.js').Reference> }[]} families in the order of the page
 * @param {ReturnType<import('./sources.js').readSentences>} sentences
 * @param {string} version of the add-in
 * @returns {string} the page; each function stands under the anchor of its id
 *
 * @typedef {{ name: string, description: string, optional?: boolean, repeating?: boolean }} Parameter
 */
export function helpPage(metadata, families, sentences, version) {
  const functions = new Map(metadata.functions.map((one) => [one.id, one]));
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; script-src 'self'; style-src 'unsafe-inline'; img-src 'self'">
<title>Foldplan functions</title>
<link rel="icon" href="assets/icon-32.png">
<style>${STYLE}</style>
<script src="search.js" defer></script>
</head>
<body>
<header>
<h1>Foldplan functions</h1>
<p>Where frequencies land after sampling, which sample rates are usable, and what the rest of the front end does about it. All frequencies of one call share one unit, whichever it is. Version ${escape(version)}.</p>
<form role="search" hidden>
<label for="words">Search</label>
<input type="search" id="words" autocomplete="off" spellcheck="false">
<output for="words"></output>
</form>
</header>
<nav aria-label="Functions">
${families.map(({ family, functions: members }) => `<h2>${escape(family)}</h2>
<ul>
${[...members.keys()].map((id) => `<li><a href="#${escape(id)}">${escape(id)}</a></li>`).join('\n')}
</ul>`).join('\n')}
<p><a href="#arguments">What arguments may be</a> · <a href="#sentences">What the error sentences mean</a></p>
</nav>
<main>
${families.flatMap(({ functions: members }) => [...members].map(([id, reference]) => functionSection(functions.get(id), reference))).join('\n')}
<section id="arguments">
<h2>What arguments may be</h2>
<p>Functions that give one result a row take a cell or a whole column for every argument; one cell serves every row. A blank row stays blank, and an error stays in its row. Functions that list rows spill a table under a header row, which <code>headers</code> = FALSE leaves out.</p>
<p>Numbers are read as the decimals of up to 15 digits that the sheet shows. What depends on zone edges is computed exactly on those and rounded once at the end; ends of rate ranges are rounded inward, so that a rate copied from a result never fails. At real sampling the zones are counted from 1 and even ones are inverted; at IQ sampling zone 0 lies around 0 and none is inverted. A frequency on a zone edge counts to the zone above, and a band may touch an edge.</p>
<p>An optional argument that is left out, or points at a blank cell, takes its default. Some spreadsheet programs deliver a blank cell as 0, so 0 also means left out where it makes no sense of its own.</p>
</section>
<section id="sentences">
<h2>What the error sentences mean</h2>
<p>A wrong argument gives <code>#VALUE!</code>, and a question without an answer <code>#N/A</code>, each with a sentence that names the argument, shows the value and says what is accepted.</p>
<dl class="sentences">
${sentences.map(sentenceItem).join('\n')}
</dl>
</section>
</main>
</body>
</html>
`;
}

const functionSection = ({ id, description, parameters }, { returns, example, result, formula, source }) => `<section id="${escape(id)}" data-function>
<h2><code>${escape(signature(id, parameters))}</code></h2>
<p>${escape(description)}</p>
<dl>
${parameters.map((parameter) => `<dt>${escape(parameter.name)}${parameter.optional ? ' <span>optional</span>' : ''}</dt><dd>${escape(parameter.description)}</dd>`).join('\n')}
</dl>
<h3>Returns</h3>
<p>${escape(returns)}</p>
<h3>Example</h3>
<p class="example"><code>${escape(example)}</code></p>
${result.length === 1 && result[0].length === 1 ? `<p class="result">${escape(result[0][0])}</p>` : resultTable(result)}
<h3>Formula</h3>
<p>${escape(formula)}</p>
<p class="source">Source: ${escape(source)}.</p>
</section>`;

const resultTable = ([titles, ...rows]) => `<div class="table" tabindex="0" role="region" aria-label="Result"><table>
<thead><tr>${titles.map((title) => `<th scope="col">${escape(title)}</th>`).join('')}</tr></thead>
<tbody>
${rows.map((row) => `<tr>${row.map((cell) => `<td>${escape(cell)}</td>`).join('')}</tr>`).join('\n')}
</tbody>
</table></div>`;

const sentenceItem = ({ code, parts, meaning }) =>
  `<dt><code>${code}</code> ${parts.map((part) => (typeof part === 'string' ? escape(part) : `<var>${escape(part.shows)}</var>`)).join('')}</dt><dd>${escape(meaning)}</dd>`;

const signature = (id, parameters) =>
  `FOLD.${id}(${parameters.map(({ name, optional, repeating }) => (optional ? `[${name}]` : repeating ? `${name}…` : name)).join(', ')})`;

const escape = (text) => text.replace(/[&<>"]/g, (character) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[character]);

const STYLE = `
:root { color-scheme: light dark; --ink: #22303c; --soft: #55636f; --paper: #fbfbf9; --line: #d9dedf; --link: #0b6470; --box: #f0f2f0; }
@media (prefers-color-scheme: dark) { :root { --ink: #dfe6ea; --soft: #a3b0ba; --paper: #161b20; --line: #333d46; --link: #6cc3cd; --box: #1f262c; } }
* { box-sizing: border-box; }
[hidden] { display: none !important; }
body { margin: 0 auto; max-width: 54rem; padding: 1.5rem 1rem 4rem; background: var(--paper); color: var(--ink); font: 16px/1.5 "Segoe UI", system-ui, sans-serif; }
a { color: var(--link); }
h1 { margin: 0; font-size: 1.6rem; }
h2 { margin: 0 0 .4rem; font-size: 1rem; overflow-wrap: anywhere; }
h3 { margin: .9rem 0 0; color: var(--soft); font-size: .8rem; font-weight: 700; }
nav h2 { margin: .8rem 0 0; color: var(--soft); font-size: .85rem; font-weight: 400; }
nav ul { display: flex; flex-wrap: wrap; gap: .1rem 1rem; margin: 0; padding: 0; list-style: none; }
form { display: flex; flex-wrap: wrap; align-items: baseline; gap: .3rem .8rem; position: sticky; top: 0; padding: .6rem 0; background: var(--paper); }
input { flex: 1 1 12rem; min-width: 0; padding: .3rem .5rem; border: 1px solid var(--soft); border-radius: 4px; background: var(--paper); color: inherit; font: inherit; }
output { color: var(--soft); font-size: .9rem; }
section { padding: 1.2rem 0; border-top: 1px solid var(--line); scroll-margin-top: 1rem; }
section:target h2 { text-decoration: underline; text-decoration-thickness: 2px; text-underline-offset: 4px; }
code { font-family: ui-monospace, Consolas, monospace; font-size: .95em; }
.example code, .result { overflow-wrap: anywhere; }
.result { padding-left: 1rem; border-left: 3px solid var(--line); font-variant-numeric: tabular-nums; }
.table { overflow-x: auto; }
table { border-collapse: collapse; font-size: .9rem; font-variant-numeric: tabular-nums; }
th, td { padding: .15rem .8rem .15rem 0; border-bottom: 1px solid var(--line); text-align: left; white-space: nowrap; }
th { color: var(--soft); font-weight: 700; }
dl { display: grid; grid-template-columns: minmax(6rem, max-content) 1fr; gap: .25rem 1.2rem; margin: .6rem 0 0; }
dt { font-weight: 700; }
dt span { color: var(--soft); font-size: .8rem; font-weight: 400; }
dd { margin: 0; }
.sentences { display: block; }
.sentences dt { margin-top: .9rem; padding: .3rem .6rem; border-radius: 4px; background: var(--box); font-weight: 400; }
.sentences dd { padding: .2rem .6rem; }
var { color: var(--link); }
.source { color: var(--soft); font-size: .9rem; }
p { margin: .4rem 0; }
@media (max-width: 30rem) { dl { grid-template-columns: 1fr; } dd { margin-bottom: .4rem; } }
`;
