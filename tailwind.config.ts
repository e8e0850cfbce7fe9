import type { Config } from 'tailwindcss';

/** Colours are the tokens of styles.css, so that light and dark need no second class. */
const token = (name: string): string => `var(--${name})`;

export default {
  content: ['./index.html', './src/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: token('paper'),
      sheet: token('sheet'),
      ink: token('ink'),
      ink2: token('ink2'),
      line: token('line'),
      line2: token('line2'),
      timber: token('timber'),
      timber2: token('timber2'),
      grain: token('grain'),
      spruce: token('spruce'),
      'spruce-wash': token('spruce-wash'),
      'on-spruce': token('on-spruce'),
      crayon: token('crayon'),
      'crayon-wash': token('crayon-wash'),
      amber: token('amber'),
      'amber-wash': token('amber-wash'),
    },
    fontFamily: { sans: ['Inter', 'system-ui', 'sans-serif'] },
    fontSize: {
      small: ['12px', '17px'],
      body: ['14px', '20px'],
      panel: ['15px', '20px'],
      figure: ['22px', '28px'],
      page: ['24px', '30px'],
    },
    fontWeight: { normal: '400', medium: '500', semibold: '600' },
    borderRadius: { none: '0', DEFAULT: '3px', full: '9999px' },
  },
} satisfies Config;
