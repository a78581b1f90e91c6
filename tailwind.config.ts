import type { Config } from 'tailwindcss';

const words = [
  "'Quarterturn Words'",
  "'Quarterturn Words Fallback'",
  "'Quarterturn Signs'",
  'ui-sans-serif',
  'system-ui',
  'sans-serif',
];

const numbers = [
  "'Quarterturn Numbers'",
  "'Quarterturn Numbers Fallback'",
  "'Quarterturn Signs'",
  'ui-monospace',
  'monospace',
];

/** Names for the tokens of src/styles/tokens.css. Colours, radii and shadows replace the defaults: there are no others to reach for. */
const config: Config = {
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: 'var(--paper)',
      glass: 'var(--glass)',
      wash: 'var(--wash)',
      ink: { DEFAULT: 'var(--ink)', 2: 'var(--ink-2)', 3: 'var(--ink-3)' },
      rule: 'var(--rule)',
      hair: 'var(--hair)',
      beam: { DEFAULT: 'var(--beam)', text: 'var(--beam-text)' },
      lit: 'var(--lit)',
      'on-lit': 'var(--on-lit)',
      fault: 'var(--fault)',
      act: 'var(--act)',
      hv: 'var(--hv)',
      da: 'var(--da)',
      rl: 'var(--rl)',
    },
    borderRadius: { none: '0', DEFAULT: '2px' },
    boxShadow: {},
    fontFamily: { sans: words, mono: numbers },
    fontSize: {
      xs: ['var(--type-xs)', 'var(--type-xs-line)'],
      s: ['var(--type-s)', 'var(--type-s-line)'],
      body: ['var(--type-body)', 'var(--type-body-line)'],
      home: ['1.03125rem', '1.4375rem'],
      section: ['1.0625rem', { lineHeight: '1.375rem', fontWeight: '650' }],
      title: ['1.75rem', { lineHeight: '1.15', fontWeight: '560' }],
      readout: ['2.125rem', { lineHeight: '1', fontWeight: '560' }],
      'readout-far': ['3.625rem', { lineHeight: '1', fontWeight: '560' }],
      dial: ['1.0625rem', { lineHeight: '1.375rem', fontWeight: '580' }],
      'dial-large': ['1.875rem', { lineHeight: '1.15', fontWeight: '580' }],
      'dial-stays': ['4.25rem', { lineHeight: '1', fontWeight: '480', letterSpacing: '-0.045em' }],
      'dial-far': ['9rem', { lineHeight: '0.86', fontWeight: '520', letterSpacing: '-0.045em' }],
    },
    fontWeight: {
      words: 'var(--weight-words)',
      strong: 'var(--weight-strong)',
      section: '650',
      title: '560',
      dial: '580',
    },
  },
};

export default config;
