import * as z from 'zod';

// Before any schema is made: zod would compile them with `new Function`, which the content security policy forbids.
z.config({ jitless: true });
