// What the function reference takes from the source files: families, formulas, sources, examples, and the sentences of errors.

import { readFileSync } from 'node:fs';
import ts from 'typescript';

/**
 * The worksheet functions of a file of `src/functions`, and the words at its head.
 * @param {string} file
 * @returns {{ family: string, functions: Map<string, Reference> }} by id
 */
export function readFamily(file) {
  const source = parse(file);
  const functions = new Map();
  for (const statement of source.statements) {
    const tags = Object.fromEntries(ts.getJSDocTags(statement).map((tag) => [tag.tagName.text, ts.getTextOfJSDocComment(tag.comment)?.trim() ?? '']));
    if (tags.customfunction === undefined) continue;
    functions.set(tags.customfunction.split(/\s/)[0], { ...readExample(tags.example), formula: tags.formula, source: tags.source, returns: tags.returns });
  }
  return { family: source.text.split('\n')[0].replace(/^\/\/ |\.$/g, ''), functions };
}

/** @typedef {{ example: string, result: string[][], formula: string, source: string, returns: string }} Reference */

/** `=FOLD.FREQ(70, 100) => 30`, or a table after the arrow, a line for each row and bars between its cells. */
function readExample(text) {
  const [example, result] = text.split(/ =>\s*/);
  return { example, result: result.split('\n').map((line) => line.split('|').map((cell) => cell.trim())) };
}

/**
 * The sentences of `src/engine/fault.ts`, each with the words above it. A part is text, or what stands there of the user's own.
 * @param {string} file
 * @returns {{ code: '#VALUE!' | '#N/A', parts: (string | { shows: string })[], meaning: string }[]}
 */
export function readSentences(file) {
  const source = parse(file);
  const sentences = [];
  const visit = (node) => {
    if (ts.isPropertyAssignment(node) && ts.isArrowFunction(node.initializer) && ts.isCallExpression(node.initializer.body)) {
      const { expression, arguments: [sentence] } = node.initializer.body;
      const [comment] = ts.getJSDocCommentsAndTags(node);
      sentences.push({ code: expression.getText(source) === 'none' ? '#N/A' : '#VALUE!', parts: partsOf(sentence), meaning: ts.getTextOfJSDocComment(comment.comment) });
    } else ts.forEachChild(node, visit);
  };
  visit(source);
  return sentences;
}

const partsOf = (sentence) => (ts.isTemplateExpression(sentence)
  ? [sentence.head.text, ...sentence.templateSpans.flatMap(({ expression, literal }) => [{ shows: nameOf(expression) }, literal.text])].filter((part) => part !== '')
  : [sentence.text]);

/** `lowValue` and `shown(lowValue)` show the low value; what is worked out on the spot is left open. */
function nameOf(expression) {
  const named = ts.isCallExpression(expression) && expression.arguments.length === 1 ? expression.arguments[0] : expression;
  return ts.isIdentifier(named) ? named.text.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`) : '…';
}

const parse = (file) => ts.createSourceFile(file, readFileSync(file, 'utf8'), ts.ScriptTarget.Latest, true);
