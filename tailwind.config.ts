import type { Config } from 'tailwindcss';

/** Roles only: a colour that has no role has no name, so it cannot be used by accident. */
const roles = [
  'ground',
  'raised',
  'well',
  'select',
  'band',
  'ink',
  'ink-2',
  'ink-3',
  'rule',
  'rule-2',
  'edge',
  'act',
  'act-deep',
  'act-mid',
  'act-pale',
  'fine',
  'needs',
  'note',
  'veil',
] as const;

const config: Config = {
  content: [],
  darkMode: ['selector', '[data-theme="night"]'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...Object.fromEntries(roles.map((role) => [role, `var(--${role})`])),
    },
    fontFamily: { serif: 'var(--serif)', sans: 'var(--ui)', ui: 'var(--ui)', mono: 'var(--num)', num: 'var(--num)' },
    borderRadius: { none: '0', sm: '2px', DEFAULT: '2px', phone: '3px' },
    boxShadow: { none: 'none' },
    extend: {
      maxWidth: { prose: '64ch', page: '1440px' },
      spacing: { page: '56px', phone: '20px' },
    },
  },
};

export default config;
