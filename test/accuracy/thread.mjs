/** Entry of a worker thread: teaches it TypeScript, then loads the work. */
import { register } from 'tsx/esm/api';

register();
await import('./thread.ts');
