import type { Config } from 'tailwindcss';
import plugin from 'tailwindcss/plugin';

const role = (name: string) => `var(--${name})`;

/** Roles of the three lights as utilities. The palette is closed: a colour that is not a role has no class. */
const config: Config = {
  content: [],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      inherit: 'inherit',
      ground: role('ground'),
      sheet: role('sheet'),
      sunk: role('sunk'),
      ink: { DEFAULT: role('ink'), 2: role('ink-2') },
      rule: { DEFAULT: role('rule'), strong: role('rule-strong') },
      edge: role('edge'),
      accent: { DEFAULT: role('accent'), ink: role('accent-ink'), wash: role('accent-wash') },
      good: { DEFAULT: role('good'), wash: role('good-wash') },
      warn: { DEFAULT: role('warn'), wash: role('warn-wash') },
      bad: { DEFAULT: role('bad'), wash: role('bad-wash') },
      band: {
        U: role('band-U'),
        B: role('band-B'),
        V: role('band-V'),
        R: role('band-R'),
        I: role('band-I'),
      },
      sky: {
        0: role('sky-0'),
        6: role('sky-6'),
        12: role('sky-12'),
        18: role('sky-18'),
        night: role('sky-night'),
        ink: role('sky-ink'),
      },
    },
    fontFamily: {
      sans: ['"IBM Plex Sans"', 'system-ui', 'sans-serif'],
      mono: ['"IBM Plex Mono"', 'ui-monospace', 'monospace'],
    },
    fontSize: {
      fine: ['0.6875rem', '1.35'],
      small: ['0.75rem', '1.4'],
      table: ['0.8125rem', '1.45'],
      body: ['0.875rem', '1.45'],
      lead: ['1.0625rem', '1.35'],
      title: ['1.375rem', '1.25'],
    },
    screens: { sm: '480px', md: '760px', lg: '1040px', xl: '1400px' },
    extend: {
      borderRadius: { tag: '3px', control: '4px', panel: '6px' },
      maxWidth: { page: '1680px', prose: '68ch' },
    },
  },
  plugins: [
    plugin(({ addVariant }) => {
      addVariant('dusk', "[data-light='dusk'] &");
      addVariant('dark-site', "[data-light='dark-site'] &");
    }),
  ],
};

export default config;
