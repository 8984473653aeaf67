/** Chapter Ground: levelling of the height, conditioning of the current. */
import { Chapter } from './chapter.ts';
import { groundFinding } from './findings.ts';

export class ChapterGround extends Chapter {
  readonly chapter = 'ground';
  readonly heading = 'Ground';

  finding(): string {
    return groundFinding(this.summary);
  }
}

customElements.define('eg-chapter-ground', ChapterGround);
