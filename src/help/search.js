// Search in the function reference: shows the functions and sentences that hold every word typed.

const form = document.querySelector('form');
const field = form.querySelector('input');
const entries = [...document.querySelectorAll('[data-function]')].map((section) => ({ parts: [section, document.querySelector(`nav a[href="#${section.id}"]`).parentElement], text: lower(section) }));
for (const term of document.querySelectorAll('.sentences dt')) {
  const meaning = term.nextElementSibling;
  entries.push({ parts: [term, meaning], text: `${lower(term)} ${lower(meaning)}` });
}
const groups = [...document.querySelectorAll('nav ul')];
const functions = entries.filter(({ parts }) => parts[0].matches('[data-function]'));

form.hidden = false;
form.addEventListener('submit', (event) => event.preventDefault());
field.addEventListener('input', show);
// A link to a function has to find it, whatever is searched for.
addEventListener('hashchange', () => {
  if (document.querySelector(':target')?.hidden) {
    field.value = '';
    show();
    document.querySelector(':target').scrollIntoView();
  }
});
show();

function show() {
  const words = field.value.toLowerCase().split(/\s+/).filter(Boolean);
  for (const { parts, text } of entries) {
    const found = words.every((word) => text.includes(word));
    for (const part of parts) part.hidden = !found;
  }
  for (const group of groups) group.hidden = group.previousElementSibling.hidden = [...group.children].every((item) => item.hidden);
  const shown = functions.filter(({ parts }) => !parts[0].hidden).length;
  const sentences = entries.filter(({ parts }) => !parts[0].hidden).length - shown;
  form.querySelector('output').value = words.length === 0 ? '' : `${shown} of ${functions.length} functions, ${sentences} sentences`;
}

function lower(element) {
  return element.textContent.toLowerCase();
}
