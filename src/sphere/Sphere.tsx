import { Component, lazy, type ReactNode, Suspense, useId, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { pathInWords, reachOf } from './path-words';
import { figureNotes } from './figure-notes';
import { PathInWords } from './PathInWords';
import { type SphereInput, sphereScene } from './scene';
import { reachTicks } from './scene-reach';
import { SphereSvg } from './SphereSvg';
import { useBoxWidth } from './use-box-width';
import { useSmallestType } from './use-smallest-type';
import { useSphereDrag } from './use-sphere-drag';
import { useWebGlWhenShown } from './use-webgl-when-shown';
import { placement, viewFrame } from './view';
import { commandForKey } from './view-keys';
import { createSphereViewStore, type SphereViewStore } from './view-store';
import { ViewControls } from './ViewControls';
import { ViewStatus } from './ViewStatus';
import './sphere.css';

const SphereThree = lazy(() => import('./SphereThree'));

interface Props {
  readonly input: SphereInput;
  /** A page's own view, so that it stays when the row changes or the sphere is taken away for a while. */
  readonly view?: SphereViewStore;
  /** Height of the figure in CSS pixels; its width is what its column gives. */
  readonly height?: number;
}

const DEFAULT_HEIGHT = 366;
const DEFAULT_WIDTH = 456;

/**
 * The sphere of states with the path of the light: three.js where there is WebGL, the same drawing as SVG before that is
 * loaded and where there is none. One name in words, keys for every turn, and the same as a table.
 */
export function Sphere({ input, view: pageView, height = DEFAULT_HEIGHT }: Props) {
  const [ownView] = useState(() => createSphereViewStore());
  const store = pageView ?? ownView;
  const view = useStore(store, (state) => state.view);
  const figure = useRef<HTMLDivElement>(null);
  const laidOutWidth = useBoxWidth(figure, DEFAULT_WIDTH);
  const width = laidOutWidth ?? DEFAULT_WIDTH;
  const helpId = useId();
  const [inWords, setInWords] = useState(false);

  const { reach, convention } = input;
  const reachDrawn = useMemo(() => (reach === undefined ? [] : reachTicks(reach)), [reach]);
  const reachTold = useMemo(() => reachOf({ reach, convention }), [reach, convention]);
  const scene = useMemo(() => sphereScene(input, reachDrawn), [input, reachDrawn]);
  const words = useMemo(() => pathInWords(input, reachTold), [input, reachTold]);
  const [cornerNote, ...moreNotes] = useMemo(() => figureNotes(input), [input]);
  const frame = useMemo(() => viewFrame(view), [view]);
  const smallestTypePx = useSmallestType(figure);
  const place = useMemo(
    () => placement(width, height, view.zoom, smallestTypePx),
    [width, height, view.zoom, smallestTypePx],
  );

  const webGl = useWebGlWhenShown(figure);
  const [ready, setReady] = useState(false);
  const [failed, setFailed] = useState(false);
  const three = webGl !== 'none' && !failed;

  const drag = useSphereDrag(store, place);

  return (
    <div className="sphere">
      <div className="sphere-frame">
        <div
          ref={figure}
          className="sphere-figure"
          style={{ height }}
          role="img"
          tabIndex={0}
          aria-label={words.summary}
          aria-describedby={helpId}
          aria-keyshortcuts="ArrowLeft ArrowRight ArrowUp ArrowDown h d r 0 + -"
          data-renderer={three && ready ? 'webgl' : 'svg'}
          onKeyDown={(event) => {
            if (event.key === 'Escape') {
              event.currentTarget.blur();
              return;
            }
            const command = commandForKey(event);
            if (command === undefined) return;
            // The page's own single letters and its scrolling stay out of it while the sphere has the focus.
            event.preventDefault();
            event.stopPropagation();
            store.getState().apply(command, input.convention);
          }}
          {...drag}
        >
          {laidOutWidth !== null && !(three && ready) && (
            <SphereSvg scene={scene} frame={frame} place={place} />
          )}
          {laidOutWidth !== null && three && (
            <FallBack onError={() => setFailed(true)}>
              <Suspense fallback={null}>
                <div className={ready ? 'sphere-layer' : 'sphere-layer sphere-layer-waiting'}>
                  <SphereThree
                    scene={scene}
                    view={view}
                    frame={frame}
                    place={place}
                    software={webGl === 'software'}
                    onReady={() => setReady(true)}
                    onLost={() => setFailed(true)}
                  />
                </div>
              </Suspense>
            </FallBack>
          )}
        </div>
        <p className="sphere-note sphere-note-top" aria-hidden="true">
          equator in table degrees
        </p>
        {cornerNote !== undefined && (
          <p className="sphere-note sphere-note-bottom" aria-hidden="true">
            {cornerNote}
          </p>
        )}
        <ViewControls
          onCommand={(command) => store.getState().apply(command, input.convention)}
          inWords={inWords}
          onInWords={setInWords}
        />
      </div>
      <p id={helpId} className="sr-only">
        Arrow keys turn it by 5°, with Shift by 1°. h, d and r face a basis, 0 goes home, plus and minus
        magnify, Escape leaves. The same stands in words behind “in words”.
      </p>
      <ViewStatus view={view} />
      {moreNotes.length > 0 && (
        <p className="sphere-words" aria-hidden="true">
          {moreNotes.map((note) => (
            <span key={note}>{note}</span>
          ))}
        </p>
      )}
      {words.phase !== undefined && <p className="sphere-words">{words.phase.text}</p>}
      {words.reach !== undefined && !inWords && <p className="sphere-words">{words.reach.text}</p>}
      {inWords && <PathInWords input={input} words={words} />}
    </div>
  );
}

/** A 3D renderer that throws must not take the page with it. */
class FallBack extends Component<
  { readonly onError: () => void; readonly children: ReactNode },
  { failed: boolean }
> {
  override state = { failed: false };

  static getDerivedStateFromError(): { failed: boolean } {
    return { failed: true };
  }

  override componentDidCatch(): void {
    this.props.onError();
  }

  override render(): ReactNode {
    return this.state.failed ? null : this.props.children;
  }
}
