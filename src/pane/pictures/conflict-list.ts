// What speaks against the rate, in words: the engine's conflicts, the worst first.

import type { Conflict } from '../../engine';
import { type Tree, element } from '../element';
import { exactFigure } from '../number-text';
import { type RulesOf } from '../ruler/rules';
import { isolated } from '../sentences';
import { sentences } from './sentences';
import type { Standing } from './standing';

/** How many stand in view; the others are a click away. */
const IN_VIEW = 5;
/** Nobody reads more; the sentence on their number stays true. */
const MOST_LISTED = 200;

/** @param rate the one that the standing is of */
export function conflictList(standing: Standing | null, rate: number, rules: RulesOf): Tree[] {
  if (!standing) return [element('p', { class: 'quiet' }, sentences.computing)];
  if (standing.problem !== null) return [element('p', { class: 'problem' }, standing.problem)];
  const { conflicts } = standing;
  if (conflicts.length === 0) return [element('p', {}, sentences.noConflicts(exactFigure(rate)))];
  const line = (conflict: Conflict) => element('li', {}, element('button', { type: 'button', class: 'link', 'data-row': rules.rows[conflict.band]!.index }, conflictSentence(conflict, rules)));
  const list = (some: Conflict[]) => element('ul', { class: 'conflicts' }, ...some.map(line));
  const rest = conflicts.slice(IN_VIEW);
  return [
    list(conflicts.slice(0, IN_VIEW)),
    ...(rest.length > 0 ? [element('details', { 'data-keep': 'conflicts' }, element('summary', {}, sentences.more(rest.length)), list(rest.slice(0, MOST_LISTED)))] : []),
  ];
}

export function conflictSentence({ kind, band, against, order, at, gap, beforeSampling }: Conflict, { rows, plan }: RulesOf): string {
  const { conflict } = sentences;
  const name = isolated(rows[band]!.name);
  const other = sentences.other[kind](against === null ? '' : isolated(rows[against]!.name), order, against === band, plan.cores);
  if (kind === 'zone edge') {
    if (beforeSampling) return conflict.edgeBefore(name);
    return gap < 0 ? conflict.crosses(name, exactFigure(at!), exactFigure(-gap)) : conflict.nearEdge(name, exactFigure(at!), exactFigure(gap));
  }
  if (beforeSampling) return conflict.before(name, other);
  return gap < 0 ? conflict.overlap(name, other, exactFigure(-gap)) : conflict.near(name, other, exactFigure(gap));
}
