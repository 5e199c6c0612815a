import { posix } from 'node:path';
import { type ParserOptions, parse } from '@babel/parser';

/** A breach of the rule, written for the person who has to mend it. */
export type Problem = string;

/** Source text by path from the project's folder, such as `harness/space.ts`. */
export type Sources = ReadonlyMap<string, string>;

/** Which rooms a room may import besides its own; nothing may import `tests`, and only `cli` may import `cli`. */
const mayImport: Readonly<Record<string, readonly string[]>> = {
  harness: [],
  tasks: ['harness'],
  methods: ['harness'],
  results: ['harness'],
  cli: ['harness', 'tasks', 'methods', 'results'],
};

/** The rooms whose files are held to the rule. */
export const rooms: readonly string[] = Object.keys(mayImport);

/** Where numbers must follow from the seed alone: no other randomness, no clock. */
const seeded =
  /^(harness\/(random|designs|space|encoding|pool|curtain|quantile)\.ts|(harness\/curtains|methods|tasks|results\/statistics)\/)/;

/** TypeScript, as the nodes of the ESTree standard; `import()` is a node of its own. */
const parsing: ParserOptions = {
  sourceType: 'module',
  plugins: ['typescript', 'estree'],
  createImportExpressions: true,
};

interface Node {
  readonly type: string;
  readonly [key: string]: unknown;
}

/** Everything wrong with the sources: forbidden imports, circles of imports, and chance or clocks where seeds rule. */
export function findProblems(sources: Sources): Problem[] {
  const problems: Problem[] = [];
  const graph = new Map<string, string[]>();
  for (const [file, source] of sources) {
    const program = parse(source, parsing).program as unknown as Node;
    const imports = findImports(program);
    problems.push(...imports.flatMap((specifier) => problemOfImport(file, specifier) ?? []));
    graph.set(
      file,
      imports.flatMap((specifier) => targetOf(file, specifier) ?? []),
    );
    if (seeded.test(file)) for (const use of findUnseeded(program)) problems.push(`${file} uses ${use}`);
  }
  return [...problems, ...findCircles(graph)];
}

/** What is wrong with one import, or `undefined`. A specifier is `undefined` when it is worked out at run time. */
function problemOfImport(file: string, specifier: string | undefined): Problem | undefined {
  const room = roomOf(file);
  if (specifier === undefined) {
    return room === 'cli' ? undefined : `${file} imports a module whose name is worked out at run time`;
  }
  if (/^(\/|file:|#|onebatch($|\/))/.test(specifier))
    return `${file} imports ${specifier} by a roundabout name`;
  const target = targetOf(file, specifier);
  if (target === undefined) return undefined;
  const other = roomOf(target);
  if (other === room || mayImport[room]?.includes(other)) return undefined;
  return `${file} imports ${target}: ${room} may not import ${other}`;
}

/** The source file that a relative specifier means, as a path from the project's folder. */
function targetOf(file: string, specifier: string | undefined): string | undefined {
  if (specifier === undefined || !/^\.\.?(\/|$)/.test(specifier)) return undefined;
  return posix.join(posix.dirname(file), specifier).replace(/\.js$/, '.ts');
}

function roomOf(file: string): string {
  return file.split('/')[0]!;
}

/** All that a module names as a module: imports and re-exports, of types too, `import()`, `require()`, `new URL()`. */
function findImports(program: Node): (string | undefined)[] {
  const constants = constantsOf(program);
  const found: (string | undefined)[] = [];
  for (const node of walk(program)) {
    if (/^(ImportDeclaration|Export(Named|All)Declaration|ImportExpression)$/.test(node.type)) {
      if (isNode(node['source'])) found.push(textOf(node['source'], constants));
    } else if (node.type === 'TSImportType') {
      found.push(textOf(node['argument'], constants));
    } else if (node.type === 'TSExternalModuleReference') {
      found.push(textOf(node['expression'], constants));
    } else if (node.type === 'CallExpression' && nameOf(node['callee']) === 'require') {
      found.push(textOf(argumentsOf(node)[0], constants));
    } else if (node.type === 'NewExpression' && nameOf(node['callee']) === 'URL') {
      const [name, base] = argumentsOf(node);
      if (base !== undefined) found.push(textOf(name, constants));
    }
  }
  return found;
}

/** Uses of chance or a clock that no seed rules. */
function findUnseeded(program: Node): Set<string> {
  const uses = new Set<string>();
  for (const node of walk(program)) {
    const use = unseededMember(node) ?? unseededCall(node) ?? unseededAlias(node) ?? unseededImport(node);
    if (use !== undefined) uses.add(use);
  }
  return uses;
}

function unseededMember(node: Node): string | undefined {
  const member = node.type === 'MemberExpression' ? memberOf(node) : undefined;
  const unseeded =
    /^(globalThis\.)?(Math\.random|Date\.now|performance\.\w+|process\.(hrtime|uptime)|crypto\.\w+)$/;
  return member !== undefined && unseeded.test(member) ? member : undefined;
}

function unseededCall(node: Node): string | undefined {
  if (node.type !== 'NewExpression' && node.type !== 'CallExpression') return undefined;
  return /^(globalThis\.)?Date$/.test(memberOf(node['callee']) ?? '') ? 'Date()' : undefined;
}

/** `const { random } = Math` and `const clock = Date` get at chance and clock by a name of their own. */
function unseededAlias(node: Node): string | undefined {
  const origin = node.type === 'VariableDeclarator' ? nameOf(node['init']) : undefined;
  const unseeded = /^(Math|Date|performance|crypto|process|globalThis)$/.test(origin ?? '');
  return unseeded ? `${origin} under another name` : undefined;
}

function unseededImport(node: Node): string | undefined {
  if (node.type !== 'ImportDeclaration') return undefined;
  const from = textOf(node['source']) ?? '';
  if (/^(node:)?(perf_hooks|process)$/.test(from)) return from;
  const names = (node['specifiers'] as Node[]).map((specifier) => nameOf(specifier['imported']));
  return /^(node:)?crypto$/.test(from) && names.some((name) => name !== 'createHash') ? from : undefined;
}

/** Circles in a graph of imports, each once, as `a.ts → b.ts → a.ts` from its first file in the alphabet. */
function findCircles(graph: ReadonlyMap<string, readonly string[]>): Problem[] {
  const circles = new Set<string>();
  const done = new Set<string>();
  const visit = (file: string, path: readonly string[]): void => {
    const start = path.indexOf(file);
    if (start >= 0) {
      circles.add(describeCircle(path.slice(start)));
      return;
    }
    if (done.has(file)) return;
    for (const next of graph.get(file) ?? []) visit(next, [...path, file]);
    done.add(file);
  };
  for (const file of graph.keys()) visit(file, []);
  return [...circles];
}

function describeCircle(files: readonly string[]): Problem {
  const first = files.indexOf([...files].sort()[0]!);
  const turned = [...files.slice(first), ...files.slice(0, first)];
  return `circle of imports: ${[...turned, turned[0]!].join(' → ')}`;
}

function* walk(node: Node): Generator<Node> {
  yield node;
  for (const value of Object.values(node)) {
    for (const child of Array.isArray(value) ? value : [value]) {
      if (isNode(child)) yield* walk(child);
    }
  }
}

function isNode(value: unknown): value is Node {
  return typeof value === 'object' && value !== null && typeof (value as Node).type === 'string';
}

function argumentsOf(node: Node): Node[] {
  return node['arguments'] as Node[];
}

/** Strings that a module names once and for all: `const name = 'text'` at its top level. */
function constantsOf(program: Node): ReadonlyMap<string, string> {
  const constants = new Map<string, string>();
  for (const statement of program['body'] as Node[]) {
    if (statement.type !== 'VariableDeclaration' || statement['kind'] !== 'const') continue;
    for (const { id, init } of statement['declarations'] as Node[]) {
      const [name, text] = [nameOf(id), textOf(init)];
      if (name !== undefined && text !== undefined) constants.set(name, text);
    }
  }
  return constants;
}

/** The text of a string, a template without gaps or a constant; `undefined` for what is worked out at run time. */
function textOf(node: unknown, constants?: ReadonlyMap<string, string>): string | undefined {
  if (!isNode(node)) return undefined;
  if (node.type === 'Literal') return typeof node['value'] === 'string' ? node['value'] : undefined;
  if (node.type === 'Identifier') return constants?.get(String(node['name']));
  if (node.type !== 'TemplateLiteral' || (node['expressions'] as Node[]).length > 0) return undefined;
  return (node['quasis'] as { value: { cooked: string } }[])[0]!.value.cooked;
}

function nameOf(value: unknown): string | undefined {
  return isNode(value) && value.type === 'Identifier' ? String(value['name']) : undefined;
}

/** `a.b.c` for a chain of names, dotted or in brackets. */
function memberOf(node: unknown): string | undefined {
  if (!isNode(node) || node.type !== 'MemberExpression') return nameOf(node);
  const object = memberOf(node['object']);
  const property = node['computed'] === true ? textOf(node['property']) : nameOf(node['property']);
  return object === undefined || property === undefined ? undefined : `${object}.${property}`;
}
