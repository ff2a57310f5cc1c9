/** The project's own files and what each imports, read by a real parser, so that the house rules see every way to import. */
import { execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { dirname, normalize } from 'node:path';
import { parseSync } from 'vite';

/** Every file of the project but those that git ignores; paths from the top, `/` between. Deleted ones are left out. */
export function projectFiles(): string[] {
  const list = execFileSync('git', ['ls-files', '-z', '--cached', '--others', '--exclude-standard'], {
    encoding: 'utf8',
  });
  return [...new Set(list.split('\0'))].filter((path) => path !== '' && existsSync(path)).sort();
}

export const isCode = (path: string): boolean => /\.(ts|tsx|mts|mjs|js)$/.test(path);

export interface Import {
  /** As written. */
  readonly specifier: string;
  /** Path from the top for a relative one, query dropped; null for a package. */
  readonly file: string | null;
  readonly line: number;
}

/** A node of the syntax tree, as far as it is looked at here. */
export interface Node {
  readonly type: string;
  readonly start: number;
  readonly [key: string]: unknown;
}

const parsed = new Map<string, unknown>();

/** Syntax tree of a file, parsed once; syntax errors throw. */
function treeOf(path: string): unknown {
  if (!parsed.has(path)) {
    const { program, errors } = parseSync(path, readFileSync(path, 'utf8'));
    if (errors.length > 0) throw new Error(`${path}: ${errors[0]!.message}`);
    parsed.set(path, program);
  }
  return parsed.get(path);
}

/** Calls `visit` with every node of a file. */
export function walk(path: string, visit: (node: Node) => void): void {
  const stack: unknown[] = [treeOf(path)];
  while (stack.length > 0) {
    const node = stack.pop();
    if (Array.isArray(node)) {
      stack.push(...node);
      continue;
    }
    if (typeof node !== 'object' || node === null) continue;
    if (typeof (node as Node).type === 'string') visit(node as Node);
    stack.push(...Object.values(node));
  }
}

/** Text of a string literal or of a template without holes. */
function literal(node: unknown): string | null {
  const { type, value, quasis } = (node ?? {}) as {
    type?: string;
    value?: unknown;
    quasis?: { value: { raw: string } }[];
  };
  if (type === 'Literal' && typeof value === 'string') return value;
  if (type === 'TemplateLiteral' && quasis?.length === 1) return quasis[0]!.value.raw;
  return null;
}

/** Static and dynamic imports, re-exports, type imports, `require` and `new URL('…', import.meta.url)`. */
export function importsOf(path: string): Import[] {
  const text = readFileSync(path, 'utf8');
  const found: Import[] = [];
  const add = (node: Node, source: unknown) => {
    const specifier = literal(source);
    const line = text.slice(0, node.start).split('\n').length;
    if (specifier === null) throw new Error(`${path}:${line}: an import that only the running program knows`);
    const relative = specifier.startsWith('.') || specifier.startsWith('/');
    const file = relative ? normalize(`${dirname(path)}/${specifier.replace(/\?.*$/, '')}`) : null;
    found.push({ specifier, file, line });
  };
  walk(path, (node) => {
    const callee = node.callee as Node | undefined;
    switch (node.type) {
      case 'ImportDeclaration':
      case 'ExportAllDeclaration':
      case 'ImportExpression':
      case 'TSImportType':
        add(node, node.source);
        break;
      case 'ExportNamedDeclaration':
        if (node.source) add(node, node.source);
        break;
      case 'TSExternalModuleReference':
        add(node, node.expression);
        break;
      case 'CallExpression':
        if (callee?.name === 'require') add(node, (node.arguments as unknown[])[0]);
        break;
      case 'NewExpression': {
        const [first, base] = node.arguments as Node[];
        const isHere = base && text.slice(base.start, base.end as number) === 'import.meta.url';
        if (callee?.name === 'URL' && isHere && /^\.{1,2}\/.*\.[cm]?[jt]sx?$/.test(literal(first) ?? ''))
          add(node, first);
        break;
      }
    }
  });
  return found;
}

/** The name of the package that a bare specifier belongs to. */
export function packageOf(specifier: string): string {
  return specifier.split('/', specifier.startsWith('@') ? 2 : 1).join('/');
}

/** A cycle among `edges`, first node repeated at the end; null where there is none. */
export function findCycle(edges: ReadonlyMap<string, readonly string[]>): string[] | null {
  const done = new Set<string>();
  const path: string[] = [];
  const visit = (node: string): string[] | null => {
    const at = path.indexOf(node);
    if (at >= 0) return [...path.slice(at), node];
    if (done.has(node)) return null;
    path.push(node);
    for (const next of edges.get(node) ?? []) {
      const cycle = visit(next);
      if (cycle) return cycle;
    }
    path.pop();
    done.add(node);
    return null;
  };
  for (const node of edges.keys()) {
    const cycle = visit(node);
    if (cycle) return cycle;
  }
  return null;
}
