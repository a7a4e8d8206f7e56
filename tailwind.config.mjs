/** Tailwind reads the tokens of src/styles/tokens.css; nothing here holds a raw colour. */
const ink = (name) => `var(--c-${name})`;

export default {
  content: ['./src/**/*.{astro,tsx,ts}'],
  theme: {
    extend: {
      colors: Object.fromEntries(
        [
          'ground',
          'cloth',
          'sheet',
          'raised',
          'sunk',
          'line',
          'line-strong',
          'line-faint',
          'ink',
          'ink-2',
          'ink-3',
          'on-ink',
          'ink-hover',
          'madder',
          'madder-strong',
          'madder-wash',
          'madder-line',
          'on-madder',
          'woad',
          'woad-wash',
          'woad-line',
          'moss',
          'moss-wash',
          'moss-line',
          'weld',
          'weld-wash',
          'weld-line',
          'focus',
          'scrim',
        ].map((name) => [name, ink(name)]),
      ),
      borderRadius: { 1: 'var(--r-1)', 2: 'var(--r-2)', 3: 'var(--r-3)' },
      boxShadow: { 1: 'var(--shadow-1)', 2: 'var(--shadow-2)', 3: 'var(--shadow-3)' },
      fontFamily: { sans: 'var(--font)' },
    },
  },
};
