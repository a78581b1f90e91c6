import { useMemo } from 'react';
import type { Convention } from '../../shared/optics/convention';
import { readRow } from '../../shared/protocol/solve-row';
import type { ProtocolKind } from '../../shared/schemas/protocols';
import { Formula } from './Formula';

interface WrittenFormulaProps {
  readonly expression: string;
  /** Whether a state or a unitary is written. */
  readonly kind: ProtocolKind;
  /** Of whoever wrote it: an R there may be an L here. */
  readonly convention: Convention;
}

/** A row as its version wrote it, typeset; as typed where this page's parser no longer reads it. */
export function WrittenFormula({ expression, kind, convention }: WrittenFormulaProps) {
  const read = useMemo(() => readRow(expression, kind, convention), [expression, kind, convention]);
  return read.ok ? (
    <Formula latex={read.reading.latex} source={expression} />
  ) : (
    <code className="font-mono text-s">{expression}</code>
  );
}
