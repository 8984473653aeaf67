/** What one source file refers to, read from its syntax tree: every form of import counts, types too. */
import { parseSync } from 'vite';

export interface Reference {
  /** As written: `../grid/maps.ts`, `ndarray`, `node:fs`. */
  readonly target: string;
  /** `value` runs at load, `lazy` when called, `type` never, `url` names a file by `new URL(…, import.meta.url)`. */
  readonly kind: 'value' | 'lazy' | 'type' | 'url';
}

export interface References {
  readonly found: readonly Reference[];
  /** Imports whose target is not a literal, as they stand in the text. */
  readonly unreadable: readonly string[];
}

interface Node { readonly type: string; readonly start: number; readonly end: number; readonly [key: string]: unknown }

/**
 * @param name the file's name; its ending says the language
 * @throws Error when the text does not parse
 */
export function importsOf(name: string, text: string): References {
  const { program, errors } = parseSync(name, text);
  if (errors[0]) throw new Error(`${name} does not parse: ${errors[0].message}`);
  const found: Reference[] = [];
  const unreadable: string[] = [];
  const add = (kind: Reference['kind'], source: unknown, whole: Node): void => {
    const target = literal(source);
    if (target === undefined) unreadable.push(text.slice(whole.start, whole.end));
    else found.push({ target, kind });
  };
  visit(program as unknown as Node, (node) => {
    switch (node.type) {
      case 'ImportDeclaration':
        add(node['importKind'] === 'type' ? 'type' : 'value', node['source'], node);
        break;
      case 'ExportNamedDeclaration':
      case 'ExportAllDeclaration':
        if (node['source']) add(node['exportKind'] === 'type' ? 'type' : 'value', node['source'], node);
        break;
      case 'ImportExpression':
        add('lazy', node['source'], node);
        break;
      case 'TSImportType':
        add('type', node['source'] ?? node['argument'], node);
        break;
      case 'TSExternalModuleReference':
        add('value', node['expression'], node);
        break;
      case 'NewExpression': {
        const [path, base] = node['arguments'] as readonly Node[];
        if (isNode(node['callee']) && node['callee']['name'] === 'URL' && base && text.slice(base.start, base.end) === 'import.meta.url') {
          add('url', path, node);
        }
        break;
      }
    }
  });
  return { found, unreadable };
}

/** The text of a string literal, or of a template without holes. */
function literal(source: unknown): string | undefined {
  if (!isNode(source)) return undefined;
  if (typeof source['value'] === 'string') return source['value'];
  if (source.type === 'TSLiteralType') return literal(source['literal']);
  const quasis = source['quasis'];
  if (source.type === 'TemplateLiteral' && Array.isArray(quasis) && quasis.length === 1) {
    return (quasis[0] as { value: { cooked: string } }).value.cooked;
  }
  return undefined;
}

function visit(node: Node, see: (node: Node) => void): void {
  see(node);
  for (const child of Object.values(node)) {
    for (const one of Array.isArray(child) ? child : [child]) if (isNode(one)) visit(one, see);
  }
}

function isNode(value: unknown): value is Node {
  return typeof value === 'object' && value !== null && typeof (value as { type?: unknown }).type === 'string';
}
