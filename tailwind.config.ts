import type { Config } from 'tailwindcss'

const token = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

/** The one set of design tokens; their light and dark values stand in app/assets/css/tailwind.css. */
export default {
  
  content: ['./app/**/*.{vue,ts}'],
  safelist: ['text-ink', 'text-copper', 'text-steel', 'text-caution', 'text-soft'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ground: token('ground'),
      panel: token('panel'),
      line: token('line'),
      ink: token('ink'),
      soft: token('soft'),
      copper: token('copper'),
      wash: token('wash'),
      steel: token('steel'),
      fail: token('fail'),
      failwash: token('failwash'),
      caution: token('caution'),
      band: token('band'),
    },
    fontFamily: {
      sans: ['"Atkinson Hyperlegible Next"', '"DejaVu Sans"', 'sans-serif'],
      mono: ['"Atkinson Hyperlegible Mono"', '"DejaVu Sans"', 'monospace'],
    },
    extend: {
      borderRadius: { DEFAULT: '10px', panel: '14px' },
      minHeight: { target: '44px' },
      minWidth: { target: '44px' },
    },
  },
} satisfies Config
