import type { ReactNode } from 'react';
import { RingDial } from '../../components/RingDial';
import { SectionHead } from '../../components/SectionHead';

const radius = 54;
const half = { offsetDeg: 12.4, direction: 1 } as const;
const quarter = { offsetDeg: 301.73, direction: -1 } as const;

function Shown({ children, words }: { readonly children: ReactNode; readonly words: string }) {
  return (
    <figure className="flex w-36.5 flex-col items-center">
      {children}
      <figcaption className="-mt-1 text-center text-s text-ink-2">{words}</figcaption>
    </figure>
  );
}

/** A mount in each of its states. */
export function MountParts() {
  return (
    <section aria-labelledby="mounts">
      <SectionHead size="small" id="mounts">
        A mount, as the receiver sees it
      </SectionHead>
      <div className="mt-2 flex flex-wrap justify-between max-sm:justify-center">
        <Shown words="stands at 83.5">
          <RingDial radius={radius} kind="half" scale={half} readingDeg={83.5} label="H-3 stands at 83.5" />
        </Shown>
        <Shown words="turn counter-clockwise, to the bead">
          <RingDial
            radius={radius}
            kind="half"
            scale={half}
            readingDeg={39.9}
            toDeg={83.5}
            label="H-3 from 39.9 to 83.5"
          />
        </Shown>
        <Shown words="numbers run the other way">
          <RingDial
            radius={radius}
            kind="quarter"
            scale={quarter}
            readingDeg={156.7}
            toDeg={187}
            label="Q-B from 156.7 to 187.0"
          />
        </Shown>
        <Shown words="stays, or dialled already">
          <RingDial
            radius={radius}
            kind="quarter"
            scale={quarter}
            readingDeg={187}
            state="stays"
            label="Q-B stays at 187.0"
          />
        </Shown>
        <Shown words="fast or slow, not settled">
          <RingDial
            radius={radius}
            kind="quarter"
            scale={quarter}
            readingDeg={301.73}
            state="unsettled"
            label="Q-B, axis not settled"
          />
        </Shown>
        <Shown words="mount without a plate">
          <RingDial
            radius={radius}
            kind="half"
            scale={half}
            readingDeg={0}
            state="empty"
            label="a mount without a plate"
          />
        </Shown>
      </div>
    </section>
  );
}
