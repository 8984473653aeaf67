/** Chapter Glow: what the reference would carry at the device's bias, and what counts as even. */
import { html, nothing } from 'lit';
import { Chapter } from './chapter.ts';
import { glowAssumption, glowFinding } from './findings.ts';
import { biasText, fixed, plain } from './format.ts';

/** Published breakdown field of hBN along the stacking axis, V/nm: Hattori et al., ACS Nano 9, 916 (2015). */
const breakdownVPerNm = 1.2;

export class ChapterGlow extends Chapter {
  readonly chapter = 'glow';
  readonly heading = 'Glow';

  finding(): string {
    return glowFinding(this.summary);
  }

  override found(path: string): string | undefined {
    const { device, reference } = this.summary;
    if (path === 'stack.biasV') return device ? plain(Number(device.biasV.toPrecision(3))) : undefined;
    if (path === 'barrier.referenceLayers') return reference?.layers === undefined ? undefined : String(reference.layers);
    return undefined;
  }

  override aboveKnobs() {
    const assumption = glowAssumption(this.summary, (path) => this.value(path));
    return html`${assumption === '' ? nothing : html`<p class="note">${assumption}</p>`}<p class="caution">${this.caution()}</p>`;
  }

  private caution(): string {
    const { device, reference } = this.summary;
    const field = device && reference?.thicknessNm ? Math.abs(device.biasV) / reference.thicknessNm : undefined;
    const here = device && field !== undefined ? ` ${biasText(device)} on the reference is ${fixed(field, 2)} V/nm${field >= breakdownVPerNm ? ', above that' : ''}.` : '';
    return `hBN breaks down near ${breakdownVPerNm} V/nm (Hattori et al., ACS Nano 9, 916, 2015).${here} Set a current limit before a bias is applied; your laboratory’s rules hold, and only trained staff apply it.`;
  }
}

customElements.define('eg-chapter-glow', ChapterGlow);
