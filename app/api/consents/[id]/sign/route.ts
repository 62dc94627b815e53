import { signConsentInput } from '@/lib/consent/input';
import { signConsent } from '@/lib/consent/sign-consent';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'consent.sign', summary: 'Sign as the participant', input: signConsentInput, create: true, run: signConsent });
