import type { core } from 'zod';

/**
 * Zod compiles schemas with `new Function` where it can. The content policy forbids it, and each attempt would be
 * reported as a violation, so it is told not to try: before any schema is made, whichever chunk makes the first,
 * and without zod in the first load. The place is where zod itself looks for its settings.
 */
const setting: core.$ZodConfig = { jitless: true };
Object.assign(globalThis, { __zod_globalConfig: setting });
