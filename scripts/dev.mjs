/** `npm run dev`: like `npm start`, with the development server in place of the build. */
import { serve } from './set-up/serve.mjs';
import { fail } from './set-up/tell.mjs';

serve('dev').catch(fail);
