import { z } from 'zod';

export const machineInput = z.object({
  site: z.string().trim().min(1, 'Name the site or area it stands in.').max(80),
  name: z.string().trim().min(1, 'Give the machine a name.').max(80),
  cautions: z.string().trim().max(2000).default(''),
});

export const machineEdit = machineInput.extend({ rowVersion: z.int().min(1) });
