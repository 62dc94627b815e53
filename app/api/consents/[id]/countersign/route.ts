import { countersignConsent } from '@/lib/consent/countersign-consent';
import { countersignInput } from '@/lib/consent/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'consent.countersign', summary: 'Sign second, as the person who took consent', input: countersignInput, change: true, confirms: true, run: countersignConsent });
