import * as z from 'zod';

/** An opaque id in a path or body. */
export const idSchema = z.uuid();
