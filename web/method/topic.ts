/** What the method page says about one thing that is done. */
import type { TemplateResult } from 'lit';

export interface Topic {
  /** By which chapters and knobs name it. */
  readonly id: string;
  readonly title: string;
  /** What is done and why, in paragraphs. */
  readonly what: TemplateResult;
  /** One line each, in plain characters. */
  readonly formulas?: readonly string[];
  readonly sources?: readonly string[];
  /** Where it fails, and what is judgement rather than measurement. */
  readonly limits: string;
  /** Paths of the settings that steer it. */
  readonly settings?: readonly string[];
}
