import { z } from 'zod';
import { idSchema } from '../../shared/schemas';

/** What every address within a lab has; longer ones extend it. */
export const labParams = z.strictObject({ labId: idSchema });
