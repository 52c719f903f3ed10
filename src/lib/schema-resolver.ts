import { zodResolver } from '@hookform/resolvers/zod';

/** Validates a form with the route's own schema. */
export const schemaResolver = zodResolver;
