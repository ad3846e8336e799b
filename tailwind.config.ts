import type { Config } from 'tailwindcss';

/** Tokens live as CSS variables in src/app/main.css, so that light and dark share one set of classes. */
const token = (name: string) => `var(--${name})`;

export default {
  content: ['./index.html', './src/**/*.{ts,tsx}'],
  theme: {
    extend: {
      colors: {
        paper: token('paper'),
        panel: token('panel'),
        raised: token('raised'),
        ink: token('ink'),
        muted: token('muted'),
        hairline: token('hairline'),
        accent: token('accent'),
        'accent-ink': token('accent-ink'),
        caution: token('caution'),
        twin: token('twin'),
      },
      fontFamily: {
        heading: ['"Newsreader Variable"', 'Georgia', 'serif'],
        text: ['"Atkinson Hyperlegible Next Variable"', 'system-ui', 'sans-serif'],
        figures: ['"Atkinson Hyperlegible Mono Variable"', 'ui-monospace', 'monospace'],
      },
    },
  },
} satisfies Config;
