import { startConsentInput } from '@/lib/consent/input';
import { startConsent } from '@/lib/consent/start-consent';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'consent.start', summary: 'Begin consent, or go on in another way', input: startConsentInput, create: true, run: startConsent });
