import type { Config } from 'tailwindcss';

/** The sheet's own classes carry the look; utilities take their values from the design tokens. */
const config: Config = {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  darkMode: ['selector', '[data-theme="dark"]'],
  theme: {
    extend: {
      colors: {
        paper: 'var(--paper)',
        sunk: 'var(--sunk)',
        ink: { DEFAULT: 'var(--ink)', 2: 'var(--ink-2)', 3: 'var(--ink-3)' },
        rule: 'var(--rule)',
        edge: 'var(--edge)',
        verdigris: {
          DEFAULT: 'var(--verdigris)',
          text: 'var(--verdigris-text)',
          tint: 'var(--verdigris-tint)',
        },
        madder: { DEFAULT: 'var(--madder)', text: 'var(--madder-text)', tint: 'var(--madder-tint)' },
        ochre: { DEFAULT: 'var(--ochre)', text: 'var(--ochre-text)', tint: 'var(--ochre-tint)' },
      },
      fontFamily: { text: 'var(--text)', mono: 'var(--mono)' },
    },
  },
};
export default config;
