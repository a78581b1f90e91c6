import type { BasisPair, SceneMark } from './scene';

const BASIS_COLOUR: Readonly<Record<BasisPair, string>> = {
  hv: 'var(--hv)',
  da: 'var(--da)',
  rl: 'var(--rl)',
};

/** The sign of one mark about its own point, in pixels of the page. */
export function MarkShape({ mark, front }: { readonly mark: SceneMark; readonly front: boolean }) {
  switch (mark.kind) {
    case 'basis': {
      const colour = BASIS_COLOUR[mark.pair];
      // The hollow shapes are drawn smaller by half their edge, so that both of a pair are the same size.
      const style = mark.filled ? { fill: colour } : { fill: 'var(--glass)', stroke: colour, strokeWidth: 2 };
      const half = mark.filled ? 5.5 : 4.5;
      if (mark.pair === 'hv')
        return <rect x={-half} y={-half} width={2 * half} height={2 * half} {...style} />;
      if (mark.pair === 'da') {
        const reach = mark.filled ? 7.2 : 6.2;
        return <path d={`M0 ${-reach} L${reach} 0 L0 ${reach} L${-reach} 0 Z`} {...style} />;
      }
      return <circle r={half} {...style} />;
    }
    case 'axis': {
      const colour = mark.last ? 'var(--beam)' : 'var(--ink-2)';
      return (
        <g stroke={colour} fill="none" strokeWidth={1.2}>
          <circle r={9.2} strokeDasharray="1.6 2" strokeWidth={1} />
          <path d="M-6 0 H6 M0 -6 V6" />
        </g>
      );
    }
    case 'between':
      return <circle r={4} fill="var(--glass)" stroke="var(--ink)" strokeWidth={1.4} />;
    case 'target':
      return (
        <g stroke="var(--ink)" strokeWidth={1.4}>
          {/* The basis mark that it stands on is seen through it. */}
          <circle r={10} fill={mark.onBasis ? 'none' : 'var(--glass)'} />
          <path d="M0 -9.5 V-14 M0 9.5 V14 M-9.5 0 H-14 M9.5 0 H14" />
        </g>
      );
    case 'reached':
      return (
        <circle
          r={5.6}
          fill="var(--lit)"
          stroke="var(--ink)"
          strokeWidth={1.2}
          strokeDasharray={front ? undefined : '2 1.6'}
        />
      );
    // Where a unitary should take a reference state: the target's reticle, smaller and with nothing over what it stands on.
    case 'wanted':
      return (
        <g stroke="var(--ink)" strokeWidth={1.1} fill="none">
          <circle r={7.5} />
          <path d="M0 -7 V-10.5 M0 7 V10.5 M-7 0 H-10.5 M7 0 H10.5" />
        </g>
      );
    case 'image':
      return (
        <circle
          r={3.9}
          fill="var(--lit)"
          stroke="var(--ink)"
          strokeWidth={1.2}
          strokeDasharray={front ? undefined : '2 1.6'}
        />
      );
    case 'point':
      return <circle r={3.1} fill="var(--ink)" stroke="var(--glass)" strokeWidth={1.2} />;
  }
}
