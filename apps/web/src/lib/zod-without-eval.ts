import { z } from 'zod';

// zod probes `new Function` when a schema is made, which the content security policy reports. Imported first in main.
z.config({ jitless: true });
