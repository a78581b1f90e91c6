import { useEffect, useRef, useState } from 'react';
import { formatAngle } from '../lib/format';
import { ellipseAt, type SphereView } from './view';

/** A key held down would otherwise read out every step. */
const QUIET_MS = 500;

/** Says where the sphere is looked at from, once the view has stood still for a moment; never at the start. */
export function ViewStatus({ view }: { readonly view: SphereView }) {
  const [said, setSaid] = useState('');
  const first = useRef(view);
  useEffect(() => {
    if (first.current === view) return undefined;
    const timer = setTimeout(() => setSaid(viewInWords(view)), QUIET_MS);
    return () => clearTimeout(timer);
  }, [view]);
  return (
    <p className="sr-only" role="status">
      {said}
    </p>
  );
}

function viewInWords(view: SphereView): string {
  const { azimuthDeg, side } = ellipseAt(view);
  const zoom = view.zoom > 1 ? `, magnified ${view.zoom.toFixed(2)} times` : '';
  return `In the middle: linear light at ${formatAngle(azimuthDeg)}, ${side}${zoom}.`;
}
