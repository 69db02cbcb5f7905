import { z } from 'zod';

export const tokenInput = z.object({
  name: z.string().trim().min(1, 'Say what the token is for.').max(80),
  role: z.enum(['engineer', 'approver', 'technician', 'admin']),
  days: z.int('A whole number of days.').min(1).max(365),
});
