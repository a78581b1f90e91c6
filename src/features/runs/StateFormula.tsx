import { useMemo } from 'react';
import type { Convention } from '../../../shared/optics/convention';
import { parseState } from '../../../shared/optics/expression';
import { Formula } from '../../components/Formula';

interface StateFormulaProps {
  readonly expression: string;
  /** Of the version: an R there may be an L here. */
  readonly convention: Convention;
}

/** A state as its version wrote it, typeset; as typed where this page's parser no longer reads it. */
export function StateFormula({ expression, convention }: StateFormulaProps) {
  const reading = useMemo(() => parseState(expression, convention), [expression, convention]);
  return reading.ok ? (
    <Formula latex={reading.latex} source={expression} />
  ) : (
    <code className="font-mono">{expression}</code>
  );
}
