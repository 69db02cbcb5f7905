import type { AxisUnits } from '@/lib/control/forms';
import type { RequirementUnit } from '@/lib/requirement';

/** The unit in which a limit of this kind is typed and shown on the worksheet of an axis. */
export function limitUnit(unit: RequirementUnit, axis: AxisUnits): string {
  switch (unit) {
    case 'percent':
      return '%';
    case 'seconds':
      return 's';
    case 'degrees':
      return '°';
    case 'ratio':
      return '';
    case 'input-per-output':
      return `${axis.input} per ${axis.output}`;
    case 'output-per-input':
      return `${axis.output} per ${axis.input}`;
  }
}
