import { Formula } from '../../components/Formula';
import { Passage } from './Passage';

/** Public: what the numbers on every page mean, and how they are worked out. */
export function Component() {
  return (
    <article className="max-w-[44rem] pb-16">
      <title>How the numbers are made · Quarterturn</title>
      <h1 className="text-title mt-8 mb-6">How the numbers are made</h1>

      <Passage title="One frame inside">
        <p>
          Light travels along +z, and everything is said as the receiver sees it: H lies level, V upright,
          angles run counter-clockwise from H, D is +45° and A is −45°. Inside, the phase is{' '}
          <Formula latex="e^{i(kz-\omega t)}" />, and S3 = +1 is the field turning counter-clockwise to the
          receiver. That sentence is about light. The letters L and R, the sign of S3 that a page shows and
          the complex conjugate in a Jones vector are names, and each lab’s convention hands them out: three
          flags, applied when an expression is read and again when a result is shown.
        </p>
      </Passage>

      <Passage title="A plate">
        <p>
          A plate with retardance δ and its fast axis at θ turns the state on the sphere by δ, right-handed,
          about the point of linear light at azimuth θ:
        </p>
        <p className="my-3 overflow-x-auto">
          <Formula latex="J(\delta,\theta)=\exp\!\left[-\tfrac{i\delta}{2}\left(\cos 2\theta\,\sigma_z+\sin 2\theta\,\sigma_x\right)\right]" />
        </p>
        <p>
          δ is what the lab measured on that plate, not what its box says. Light meets the plates in beam
          order, and angles on the sphere are twice those on the table.
        </p>
      </Passage>

      <Passage title="From an angle to a dial">
        <p>
          A dial reads its zero plus or minus θ. The zero is the reading with the fast axis along H; the sign
          is the way the engraved numbers run for the receiver. The result is rounded to the finest step of
          that mount, and the state that the <em>rounded</em> dials give is worked out again. A page shows
          both figures where they differ.
        </p>
      </Passage>

      <Passage title="Every solution, not the first">
        <p>
          For two plates, the condition that no light is left in the orthogonal state is two real equations.
          Eliminating one plate leaves a trigonometric polynomial of the fourth degree in twice the other
          plate’s angle, and its roots are all the settings there are: four for most targets, two or none near
          the edge of what real plates reach. Nothing is searched from random starts, so nothing is missed by
          luck. Where no setting is exact, the nearest one is given with its true infidelity and with how far
          it falls short. Circular light from a level input is the usual case: plates that are a little off
          cannot quite reach the poles.
        </p>
      </Passage>

      <Passage title="How far off the light will be">
        <p>
          Fidelity near 1 is written as what is missing, <Formula latex="1-F" />, a quarter of the squared
          distance between two pure states on the sphere. What is expected of a setting adds, to first order,
          the uncertainty of every zero, every retardance, the mounts’ repeatability, the finest step of each
          dial (a setting lies evenly anywhere within one step, a variance of step²/12) and the input
          polariser’s angle. The interval beside it runs from its 5 % to its 95 % point. The bracket on a
          fidelity axis is the protocol’s tolerance, and right of it is within.
        </p>
      </Passage>

      <Passage title="What the product cannot know">
        <p>
          It knows a plate only as it was calibrated, at one wavelength and in one seat. It cannot see that a
          plate has slipped, that the beam has moved, or which of two axes is the fast one if nobody has
          settled it. It never says that a beam is safe.
        </p>
      </Passage>

      <Passage title="Sources">
        <ul className="list-none space-y-2">
          <li>
            R. Simon and N. Mukunda, Physics Letters A 143, 165 (1990): which sets of plates reach which turns
            of the sphere.
          </li>
          <li>
            IEEE Std 149-1979, and the 1974 resolution of the International Astronomical Union as told by
            Hamaker and Bregman, Astronomy and Astrophysics Supplement 117, 161 (1996): who names the hands,
            and from where.
          </li>
          <li>
            Guide to the Expression of Uncertainty in Measurement, 7.2.6: at most two digits of an
            uncertainty.
          </li>
        </ul>
      </Passage>
    </article>
  );
}
