/** A mark per outcome, so that colour is not the only sign. */
import { html, svg } from 'lit';
import type { Requirement } from './requirement.ts';

const drawings: Readonly<Record<Requirement['outcome'], unknown>> = {
  enough: svg`<path d="M3 8.5l3.5 3.5L13 4.5"></path>`,
  doubtful: svg`<path d="M2 9.5c2-4 4-4 6-1.5s4 2.5 6-1.5"></path>`,
  short: svg`<path d="M3 8h10"></path>`,
};

/** A check, a wave, a bar. */
export function verdictMark(outcome: Requirement['outcome']) {
  return html`<svg viewBox="0 0 16 16" aria-hidden="true">${drawings[outcome]}</svg>`;
}
