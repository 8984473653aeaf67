import { fileURLToPath } from 'node:url';

/** The project's folder with a separator at its end; the launcher states it, because bundled code lies elsewhere than its source. */
export const root: string = process.env['EVENGLOW_ROOT'] ?? fileURLToPath(new URL('../../', import.meta.url));
