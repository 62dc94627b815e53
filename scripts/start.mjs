/** `npm start`: installs, prepares, builds and serves the demonstration, with Node's built-ins until the packages are there. */
import { serve } from './set-up/serve.mjs';
import { fail } from './set-up/tell.mjs';

serve('start').catch(fail);
