import { type Document, isMap, isNode, isScalar, LineCounter, type Node, parseDocument } from 'yaml';
import type { Catalogue } from '../catalogue.js';
import { OnebatchError } from '../errors.js';
import { planFileSchema, spellOut } from './file-schema.js';
import type { Plan } from './plan.js';
import { check, type KeyPath, type Problem, writePath } from './problems.js';
import { resolve } from './resolve.js';

/**
 * Reads a plan file's text.
 *
 * @param fileName how messages name the file; without its ending it is the name of a plan that gives none.
 * @throws OnebatchError (`bad-plan`) with one line for each problem: file, line, key, what is wrong, what is known.
 */
export function readPlan(text: string, fileName: string, catalogue: Catalogue): Plan {
  const lines = new LineCounter();
  const document = parseDocument(text, { lineCounter: lines, merge: true, logLevel: 'error' });
  const broken = document.errors[0];
  if (broken !== undefined) {
    const { line, col } = lines.linePos(broken.pos[0]);
    const [message = ''] = broken.message.split(/ at line|\n|; please use/);
    throw new OnebatchError(
      'bad-plan',
      `${fileName}:${line}: column ${col}: not readable as YAML: ${message}`,
    );
  }
  const fail = (problems: readonly Problem[]) => {
    const described = problems.map(({ path, message }) => {
      return `${fileName}:${lineOf(document, lines, path)}: ${writePath(path) || 'the plan'}: ${message}`;
    });
    throw new OnebatchError('bad-plan', described.join('\n'));
  };
  const file = check(planFileSchema, spellOut(plainValue(document, fileName) ?? {}));
  if (file.value === undefined) return fail(file.problems) as never;
  const { plan, problems } = resolve(file.value, nameOf(fileName), catalogue);
  if (problems.length > 0) fail(problems);
  return plan;
}

/** The document's value, with aliases filled in. */
function plainValue(document: Document, fileName: string): unknown {
  try {
    const value: unknown = document.toJS();
    JSON.stringify(value);
    return value;
  } catch (cause) {
    const why = cause instanceof ReferenceError ? cause.message : 'an anchor stands inside itself';
    throw new OnebatchError('bad-plan', `${fileName}: not readable as YAML: ${why}`, { cause });
  }
}

/** The line of a key, or of the nearest key above it that stands in the file. */
function lineOf(document: Document, lines: LineCounter, path: KeyPath): number {
  for (let length = path.length; length > 0; length--) {
    const range = nodeAt(document, path.slice(0, length))?.range;
    if (range != null) return lines.linePos(range[0]).line;
  }
  return 1;
}

/** The node of a key itself where the path ends in one, else of the entry of a list. */
function nodeAt(document: Document, path: KeyPath): Node | undefined {
  const above = document.getIn(path.slice(0, -1), true);
  const last = path.at(-1);
  const key = isMap(above)
    ? above.items.find((pair) => isScalar(pair.key) && pair.key.value === last)?.key
    : undefined;
  const node = key ?? document.getIn(path, true);
  return isNode(node) ? node : undefined;
}

function nameOf(fileName: string): string {
  const base = fileName.split(/[\\/]/).at(-1) ?? fileName;
  const stem = base.replace(/(\.plan)?\.ya?ml$/, '').replace(/[^\w.+-]/g, '-');
  return /^[A-Za-z0-9]/.test(stem) ? stem : 'plan';
}
