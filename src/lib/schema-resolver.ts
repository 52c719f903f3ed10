import { zodResolver } from '@hookform/resolvers/zod';
import { config } from 'zod';

// Zod compiles schemas with `new Function` where it can. The content policy forbids it, and each attempt would
// be reported as a violation, so it is told not to try.
config({ jitless: true });

/** Validates a form with the route's own schema. */
export const schemaResolver = zodResolver;
