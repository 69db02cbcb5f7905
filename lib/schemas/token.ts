import { z } from 'zod';
import { line } from './fields';

export const tokenInput = z.object({
  name: line(80, 'Say what the token is for.'),
  role: z.enum(['engineer', 'approver', 'technician', 'admin']),
  days: z.int('A whole number of days.').min(1).max(365),
});
