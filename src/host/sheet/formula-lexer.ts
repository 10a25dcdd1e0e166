// Reads formulas as a spreadsheet program does where Univer does not: a defined name may be spelled like a function (`Rate` and RATE),
// and the same formula text means something else in another workbook.

import { type ISequenceNode, LexerTreeBuilder, sequenceNodeType } from '@univerjs/engine-formula';

type NameContext = Parameters<LexerTreeBuilder['treeBuilder']>[2];

/** Takes the place of Univer's LexerTreeBuilder. */
export class FormulaLexer extends LexerTreeBuilder {
  /** While a formula is made into a tree, its defined names are replaced by what they stand for. */
  private replacingNames = false;

  override treeBuilder(formula: string, transformSuffix?: boolean, names?: NameContext): ReturnType<LexerTreeBuilder['treeBuilder']> {
    this.replacingNames = true;
    try {
      return super.treeBuilder(formula, transformSuffix, names && withoutSharedCache(names));
    } finally {
      this.replacingNames = false;
    }
  }

  override getSequenceNode(...args: Parameters<LexerTreeBuilder['getSequenceNode']>): (string | ISequenceNode)[] {
    const nodes = super.getSequenceNode(...args);
    return this.replacingNames ? nodes.map((node, i) => (isCall(node, nodes[i + 1]) ? { ...node, nodeType: sequenceNodeType.NORMAL } : node)) : nodes;
  }
}

/** A name before a bracket is a function, and no defined name. */
const isCall = (node: string | ISequenceNode, next: string | ISequenceNode | undefined): node is ISequenceNode =>
  typeof node !== 'string' && node.nodeType === sequenceNodeType.FUNCTION && next === '(';

/**
 * Trees are cached by formula text alone, for all workbooks of the process, unless a name in the text has changed. A changed name that
 * every text contains, "", makes each workbook build its own; those are cached by workbook, one level above.
 */
function withoutSharedCache(names: NonNullable<NameContext>): NonNullable<NameContext> {
  return {
    ...names,
    getDirtyDefinedNameMap() {
      const changed = names.getDirtyDefinedNameMap();
      return names.unitId ? { ...changed, [names.unitId]: { ...changed[names.unitId], '': 'changed' } } : changed;
    },
  };
}
