import { z } from 'zod';

/** Set before the first shape is made: zod would otherwise try out `Function`, which the page's policy refuses. */
z.config({ jitless: true });

export { z };
