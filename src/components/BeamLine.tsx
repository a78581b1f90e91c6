type BeamLineState =
  | { readonly kind: 'empty' }
  | { readonly kind: 'working'; readonly share: number | null }
  | { readonly kind: 'wrong'; readonly share?: number | undefined }
  | { readonly kind: 'cut-off' };

/** A short beam: dotted, lit up to where the work is, stopped at a red bar, or broken by a gap. */
export function BeamLine({ state }: { readonly state: BeamLineState }) {
  return (
    <svg aria-hidden="true" width="100%" height="24" className="block overflow-visible">
      <g transform="translate(0 12)">
        <Pieces state={state} />
      </g>
    </svg>
  );
}

const percent = (share: number): string => `${(Math.min(1, Math.max(0, share)) * 100).toFixed(2)}%`;

function Pieces({ state }: { readonly state: BeamLineState }) {
  switch (state.kind) {
    case 'empty':
      return <line x1="0" x2="100%" className="stroke-rule" strokeWidth="1.2" strokeDasharray="1.5 4" />;
    case 'working': {
      const at = percent(state.share ?? 0.38);
      return (
        <>
          <line x1="0" x2="100%" className="stroke-rule" strokeWidth="1" />
          <line x1="0" x2={at} className="stroke-beam" strokeWidth="2.6" />
          <circle cx={at} r="7.2" className="fill-lit stroke-ink" strokeWidth="1.3" />
        </>
      );
    }
    case 'wrong': {
      const share = state.share ?? 0.44;
      return (
        <>
          <line x1="0" x2={percent(share)} className="stroke-beam" strokeWidth="2.6" />
          <line
            x1={percent(share + 0.07)}
            x2="100%"
            className="stroke-rule"
            strokeWidth="1.2"
            strokeDasharray="1.5 4"
          />
          <line
            x1={percent(share)}
            x2={percent(share)}
            y1="-12"
            y2="12"
            className="stroke-fault"
            strokeWidth="3.2"
          />
        </>
      );
    }
    case 'cut-off':
      return (
        <>
          <line x1="0" x2="40.7%" className="stroke-beam" strokeWidth="2.6" />
          <line x1="59.3%" x2="100%" className="stroke-beam" strokeWidth="2.6" />
          <line x1="46%" x2="54.5%" className="stroke-ink" strokeWidth="2" strokeDasharray="3.5 3.5" />
          <line x1="40.7%" x2="40.7%" y1="-9" y2="9" className="stroke-ink" strokeWidth="2" />
          <line x1="59.3%" x2="59.3%" y1="-9" y2="9" className="stroke-ink" strokeWidth="2" />
        </>
      );
  }
}
