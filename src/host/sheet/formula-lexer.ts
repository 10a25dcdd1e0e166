// Reads formulas as a spreadsheet program does where Univer does not: a defined name may be spelled like a function (`Rate` and RATE),
// the same formula text means something else in another workbook, and a name may come to mean something else.

import { type ISequenceNode, LexerNode, LexerTreeBuilder, sequenceNodeType } from '@univerjs/engine-formula';

type NameContext = Parameters<LexerTreeBuilder['treeBuilder']>[2];

/** Takes the place of Univer's LexerTreeBuilder. */
export class FormulaLexer extends LexerTreeBuilder {
  /** While a formula is made into a tree, its defined names are replaced by what they stand for. */
  private replacingNames = false;

  override treeBuilder(formula: string, transformSuffix?: boolean, names?: NameContext): ReturnType<LexerTreeBuilder['treeBuilder']> {
    const words = new Set(names ? [] : this.wordsOf(formula));
    this.replacingNames = true;
    try {
      const tree = super.treeBuilder(formula, transformSuffix, names && withoutSharedCache(noting(words, names)));
      // Univer forgets which names a formula uses, and would go on with what they stood for.
      if (tree instanceof LexerNode) tree.setDefinedNames([...words]);
      return tree;
    } finally {
      this.replacingNames = false;
    }
  }

  /** What may be a name in a formula of a workbook that has none yet. */
  private wordsOf(formula: string): string[] {
    const nodes = this.sequenceNodesBuilder(formula) ?? [];
    return nodes.flatMap((node, i) => (isWord(node) && nodes[i + 1] !== '(' ? [node.token.trim()] : []));
  }

  override getSequenceNode(...args: Parameters<LexerTreeBuilder['getSequenceNode']>): (string | ISequenceNode)[] {
    const nodes = super.getSequenceNode(...args);
    return this.replacingNames ? nodes.map((node, i) => (isWord(node) && nodes[i + 1] === '(' ? { ...node, nodeType: sequenceNodeType.NORMAL } : node)) : nodes;
  }
}

/** A word that is no reference and no number: a function where a bracket follows, else a name. */
const isWord = (node: string | ISequenceNode): node is ISequenceNode => typeof node !== 'string' && node.nodeType === sequenceNodeType.FUNCTION;

/** Notes each word that is looked up as a name, found or not: it may be defined later. */
function noting(words: Set<string>, names: NonNullable<NameContext>): NonNullable<NameContext> {
  return {
    ...names,
    getValueByName(unitId, word) {
      const found = names.getValueByName(unitId, word);
      words.add(found?.name ?? word);
      return found;
    },
  };
}

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
