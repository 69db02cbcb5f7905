import { z } from 'zod';
import { rowVersion } from './fields';
import { loadCasesShape, requirementShape } from './loop';

export const loadCasesInput = z.object({ loadCases: loadCasesShape, rowVersion });

export const requirementInput = z.object({ requirement: requirementShape, rowVersion });
