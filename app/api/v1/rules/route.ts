import { RULES } from '@/lib/control/rules';
import { endpoint } from '@/lib/http/endpoint';

export const GET = endpoint({ run: async () => ({ items: RULES }) });
