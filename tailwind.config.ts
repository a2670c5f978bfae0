import type { Config } from 'tailwindcss'

export default {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    extend: {
      colors: {
        paper: 'var(--paper)', desk: 'var(--desk)', ink: 'var(--ink)', 'ink-2': 'var(--ink-2)', rule: 'var(--rule)', 'rule-2': 'var(--rule-2)',
        hand: 'var(--hand)', alarm: 'var(--alarm)', 'pen-1': 'var(--pen-1)', 'pen-2': 'var(--pen-2)', 'pen-3': 'var(--pen-3)',
        sheet: 'var(--sheet)', 'sheet-edge': 'var(--sheet-edge)',
      },
      fontFamily: { sans: ['var(--sans)'], book: ['var(--book)'] },
    },
  },
} satisfies Config
