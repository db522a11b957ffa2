import headlessui from '@headlessui/tailwindcss';
import type { Config } from 'tailwindcss';

/** Colours are custom properties (src/assets/theme.css), so that the paper and the dim-room theme share every class. */
export default {
  content: ['./index.html', './src/**/*.{vue,ts}', './templates/**/*.vue'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: 'var(--paper)',
      sheet: 'var(--sheet)',
      wash: 'var(--wash)',
      ink: 'var(--ink)',
      soft: 'var(--soft)',
      hair: 'var(--hair)',
      edge: 'var(--edge)',
      focus: 'var(--focus)',
      ok: 'var(--ok)',
      look: 'var(--look)',
      rolling: 'var(--rolling)',
    },
    extend: {
      fontFamily: { sans: ['"Atkinson Hyperlegible"', 'system-ui', 'sans-serif'] },
    },
  },
  plugins: [headlessui],
} satisfies Config;
