/** Entry of the page: starts the computation and the session, and opens on the invented samples. */
import { createPool } from '../workers/client.ts';
import { App } from './app/app.ts';
import { rememberedTheme } from './app/theme.ts';
import { openDemo } from './session/actions/open-demo.ts';
import { Session, firstState } from './session/session.ts';

const session = new Session(createPool(), { ...firstState, theme: rememberedTheme() });
const app = new App();
app.session = session;
document.body.append(app);
void session.do(openDemo);
