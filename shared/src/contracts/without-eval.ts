import { z } from 'zod';

/**
 * Imported for its effect, before any contract: keeps the contracts from compiling validators at run time. A browser page
 * whose content security policy has no `unsafe-eval` refuses that, and each schema asks for it when it is made.
 */
z.config({ jitless: true });
