import { z } from 'zod';
import { line, paragraph, rowVersion } from './fields';

export const machineInput = z.object({
  site: line(80, 'Name the site or area it stands in.'),
  name: line(80, 'Give the machine a name.'),
  cautions: paragraph(2000).default(''),
});

export const machineEdit = machineInput.extend({ rowVersion });
