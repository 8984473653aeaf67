/** The page's element as a person sees it. */
import { assert } from 'chai';
import { WelcomeElement } from '../../web/welcome.ts';

describe('the welcome page', () => {
  let element: WelcomeElement;

  beforeEach(async () => {
    element = new WelcomeElement();
    document.body.append(element);
    await element.updateComplete;
  });

  afterEach(() => { element.remove(); });

  it('is headed by the name', () => {
    assert.equal(text('h1'), 'Evenglow');
  });

  it('says that this version works on the command line, and how', () => {
    assert.match(text('h2'), /works on the command line/);
    assert.match(text('dl'), /npx evenglow appraise/);
  });

  it('shows the commands that it is given', async () => {
    element.commands = [{ line: 'npx evenglow recipe', does: 'prints the default recipe' }];
    await element.updateComplete;
    assert.equal(text('dt'), 'npx evenglow recipe');
    assert.equal(text('dd'), 'prints the default recipe');
  });

  function text(selector: string): string {
    return element.shadowRoot?.querySelector(selector)?.textContent?.trim() ?? '';
  }
});
