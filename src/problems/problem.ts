/**
 * Everything that can go wrong with an input has a code and typed detail here, and one sentence
 * (file, place, value, way out) that the app and the command line share.
 */
import { catalogue } from './catalogue.ts';

type Catalogue = typeof catalogue;
export type ProblemCode = keyof Catalogue;
export type ProblemDetail<Code extends ProblemCode> = Parameters<Catalogue[Code]>[0];

/** A remark that travels with a result without stopping it. */
export interface Notice {
  readonly code: ProblemCode;
  readonly message: string;
}

/** An input that cannot be used, said in one sentence. `code` and `detail` survive a worker's wire. */
export class Problem<Code extends ProblemCode = ProblemCode> extends Error {
  override readonly name = 'Problem';
  readonly code: Code;
  readonly detail: ProblemDetail<Code>;

  constructor(code: Code, detail: ProblemDetail<Code>) {
    super(sentence(code, detail));
    this.code = code;
    this.detail = detail;
  }
}

/** The sentence of a problem or remark. */
export function sentence<Code extends ProblemCode>(code: Code, detail: ProblemDetail<Code>): string {
  const write = catalogue[code] as (detail: ProblemDetail<Code>) => string;
  return write(detail);
}

/** A remark from the same catalogue as the errors. */
export function notice<Code extends ProblemCode>(code: Code, detail: ProblemDetail<Code>): Notice {
  return { code, message: sentence(code, detail) };
}
