/** What to ask of a person when a sample's files do not state something, read from the problem's code and detail. */

/** One question of the import form. */
export type Question = FieldQuestion | PagesQuestion;

export interface FieldQuestion {
  readonly kind: 'field';
  /** The recipe's path that the answer goes to. */
  readonly path: string;
  readonly required: boolean;
  /** Asked only when the map is said to be this. */
  readonly onlyFor?: 'height' | 'current';
}

/** Which maps of a file are meant, where none says what it is. */
export interface PagesQuestion {
  readonly kind: 'pages';
  readonly file: string;
  readonly pages: number;
}

interface Failure {
  readonly code: string;
  readonly detail?: unknown;
}

const size: readonly Question[] = [{ kind: 'field', path: 'scan.widthUm', required: true }, { kind: 'field', path: 'scan.heightUm', required: false }];
const heightUnit: FieldQuestion = { kind: 'field', path: 'scan.heightUnit', required: true };
const currentUnit: FieldQuestion = { kind: 'field', path: 'scan.currentUnit', required: true };
const bias: Question = { kind: 'field', path: 'scan.biasV', required: false, onlyFor: 'current' };

/** The questions that would mend a problem; none when a person cannot mend it by stating something. */
export function questionsOf({ code, detail }: Failure): readonly Question[] {
  switch (code) {
    case 'statements-missing': return missing(word(detail, 'options'));
    // A choice that already comes from the recipe is not asked for again: it has to be undone.
    case 'size-disagreement': return word(detail, 'way').includes('decide with') ? size : [];
    case 'unit-disagreement': return word(detail, 'by').startsWith('scan.') ? [] : [/A$|^relative$/.test(word(detail, 'asked')) ? currentUnit : heightUnit];
    case 'map-flat': return [heightUnit];
    case 'role-unknown-pages': return pages(detail);
    default: return [];
  }
}

/** Why the person is asked, as one sentence. */
export function reasonOf({ code, detail, message }: Failure & { readonly message: string }): string {
  return code === 'statements-missing' ? `These files do not state ${word(detail, 'what')}.` : message;
}

/** The options that the problem names are the recipe's paths that are missing. */
function missing(options: string): Question[] {
  const asked = (path: string): boolean => options.includes(path);
  const role = asked('scan.channel');
  // A lone map of unknown role has one unit: which of the two depends on the role.
  const either = role && asked('scan.heightUnit') && asked('scan.currentUnit');
  const unit = (question: FieldQuestion, onlyFor: 'height' | 'current'): Question => (either ? { ...question, onlyFor } : question);
  return [
    ...(role ? [{ kind: 'field', path: 'scan.channel', required: true } as const] : []),
    ...(asked('scan.heightUnit') ? [unit(heightUnit, 'height')] : []),
    ...(asked('scan.currentUnit') ? [unit(currentUnit, 'current')] : []),
    ...(asked('scan.widthUm') ? size : []),
    ...(options === '' ? [] : [bias]),
  ];
}

function pages(detail: unknown): Question[] {
  const count = typeof detail === 'object' && detail !== null ? (detail as { readonly pages?: unknown }).pages : undefined;
  const file = word(detail, 'file');
  return typeof count === 'number' && file !== '' ? [{ kind: 'pages', file, pages: count }] : [];
}

function word(detail: unknown, key: string): string {
  const value = typeof detail === 'object' && detail !== null ? (detail as Readonly<Record<string, unknown>>)[key] : undefined;
  return typeof value === 'string' ? value : '';
}
