import type { Config } from 'tailwindcss';

const token = (name: string) => `var(--${name})`;

/** The design tokens live in app/globals.css; Tailwind only gives them utility names. */
const config: Config = {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: Object.fromEntries(
      [
        'paper',
        'sheet',
        'ink',
        'soft',
        'rule',
        'hair',
        'edge',
        'petrol',
        'petrol-wash',
        'on-petrol',
        'plum',
        'ochre',
        'ochre-wash',
        'brick',
        'brick-wash',
        'moss',
        'moss-wash',
      ].map((name) => [name, token(name)]),
    ),
    fontFamily: { sans: token('font-text'), mono: token('font-mono') },
    fontSize: {
      xs: ['12.5px', '1.4'],
      sm: ['13.5px', '1.45'],
      base: ['15px', '1.5'],
      lg: ['18px', '1.35'],
      xl: ['22px', '1.25'],
      '2xl': ['27px', '1.15'],
      '3xl': ['34px', '1.1'],
    },
    borderRadius: { none: '0', sm: '3px', DEFAULT: '5px', lg: '7px', full: '9999px' },
  },
};

export default config;
