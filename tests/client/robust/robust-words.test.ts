import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_CONVENTION, degrees, toRadians } from '../../../shared/optics';
import { PUBLISHED_COMPOSITES } from '../../../shared/optics/robust';
import { dialledInfidelity, listedSettings, searchedDesign } from '../../../src/features/robust/design';
import { drawnCurves, heldOver, powerOf } from '../../../src/features/robust/design-curves';
import {
  copiedText,
  effectWords,
  errorWords,
  plainWords,
  ratioWords,
} from '../../../src/features/robust/design-words';
import { measuredPower, wholePower, withinTolerance } from '../../../src/features/robust/error-power';
import { apartLabels, infidelityAxis, shareOfAxis } from '../../../src/features/robust/infidelity-axis';
import { publishedDesign } from '../../../src/features/robust/published-design';
import { FIRST_FORM, formOf, type RobustForm, searchOf } from '../../../src/features/robust/robust-form';
import { readQuestion } from '../../../src/features/robust/robust-question';
import { readTypedPlates } from '../../../src/features/robust/typed-plates';
import { wavelengthSlopes } from '../../../src/features/robust/wavelength-slopes';
import { fewestPlates, robustStudy } from '../../../src/workers/robust-study';
import { infidelityAscii } from '../../../src/lib/format';
import { bench, id, plate } from './fixture';

function asked(change: Partial<RobustForm>, of?: ReturnType<typeof bench>) {
  const read = readQuestion({ ...FIRST_FORM, ...change }, of, DEFAULT_CONVENTION);
  if (!read.ok) throw new Error(JSON.stringify(read.faults));
  return read.asked;
}

function faults(change: Partial<RobustForm>, of?: ReturnType<typeof bench>) {
  const read = readQuestion({ ...FIRST_FORM, ...change }, of, DEFAULT_CONVENTION);
  if (read.ok) throw new Error('it was read');
  return read.faults;
}

function studied(question: ReturnType<typeof asked>) {
  const steps = robustStudy(question.question);
  const shares: number[] = [];
  for (;;) {
    const step = steps.next();
    if (step.done === true) return { study: step.value, shares };
    shares.push(step.value);
  }
}

describe('plates typed by retardance', () => {
  const refused = (text: string): string => {
    const read = readTypedPlates(text);
    return read.ok ? 'read' : read.sentence;
  };

  it('are read with gaps and signs of degree; what is no retardance is named with its place', () => {
    expect(readTypedPlates(' 90  180°; 90deg ')).toEqual({ ok: true, retardancesDeg: [90, 180, 90] });
    expect(refused('90 −180')).toMatch(/^Plate 2: a retardance is above 0/u);
    expect(refused('90 ninety')).toMatch(/^Plate 2: “ninety” is no retardance/u);
    expect(refused('90, 180')).toMatch(/^Plate 1: “90,” has a comma/u);
  });

  it('are two to six', () => {
    expect(refused('')).toMatch(/^No plate is written/u);
    expect(refused('180')).toMatch(/^One plate has nothing to cancel an error with/u);
    expect(refused('1 2 3 4 5 6 7')).toMatch(/^7 plates are more/u);
    expect(refused('1 2 3 4 5 6')).toBe('read');
  });
});

describe('the address of a question', () => {
  it('brings the same question back, whatever is typed', () => {
    fc.assert(
      fc.property(
        fc.record({
          kind: fc.constantFrom('prepare' as const, 'apply' as const),
          text: fc.string(),
          input: fc.string(),
          benchId: fc.constantFrom(null, id(4)),
          plates: fc.string(),
          error: fc.constantFrom('retardance' as const, 'wavelength' as const),
          width: fc.string(),
          starts: fc.string(),
          seed: fc.string(),
        }),
        ({ kind, text, error, width, ...rest }) => {
          const form: RobustForm = {
            ...FIRST_FORM,
            ...rest,
            kind,
            error,
            targets: { ...FIRST_FORM.targets, [kind]: text },
            widths: { ...FIRST_FORM.widths, [error]: width },
          };
          const back = formOf(new URLSearchParams(searchOf(form).toString()));
          expect(searchOf(back).toString()).toBe(searchOf(form).toString());
          expect(back.targets[kind]).toBe(text);
          expect(back.benchId).toBe(form.benchId);
        },
      ),
    );
  });
});

describe('a question that can’t be asked', () => {
  it('says at which field, each with what to do', () => {
    expect(faults({ targets: { ...FIRST_FORM.targets, apply: 'rotate(x, 90)' } }).target?.column).toBe(11);
    expect(faults({ plates: '180' }).plates).toContain('two to six');
    expect(faults({ error: 'wavelength' }).error).toContain('Choose a bench');
    expect(faults({ widths: { ...FIRST_FORM.widths, retardance: '0' } }).width).toContain('above 0');
    expect(faults({ starts: '2.5' }).starts).toContain('whole number');
    expect(faults({ seed: '-1' }).seed).toContain('whole number');
    expect(faults({ kind: 'prepare', input: 'H + Q' }).input?.column).toBe(5);
    expect(faults({ benchId: id(9) }).bench).toContain('not among');
    expect(faults({ benchId: id(9) }, bench(9, 'arm', [plate(1, 'H-1', 180)])).bench).toContain('One plate');
  });

  it('doesn’t ask a unitary for the light before the plates', () => {
    expect(asked({ input: 'no light at all' }).question.problem.goal.kind).toBe('apply');
  });

  it('about wavelength names the plate that nothing is known of, and why', () => {
    const unknown = plate(2, 'Q-D', 92, { material: null });
    const at = bench(9, 'gate bench', [plate(1, 'H-1', 180), unknown]);
    const { error } = faults({ benchId: id(9), error: 'wavelength' }, at);
    expect(error).toContain('Q-D');
    expect(error).not.toContain('H-1');
    expect(error).toContain('material');
  });
});

describe('the wavelength at a bench', () => {
  it('lowers the retardance of a zero-order plate a little faster than 1/λ does', () => {
    const read = wavelengthSlopes(bench(9, 'arm', [plate(1, 'H-1', 180), plate(2, 'Q-1', 90)]));
    if (!read.ok) throw new Error(read.sentence);
    const [half = NaN, quarter = NaN] = read.perNmRad;
    // Quartz's birefringence falls with the wavelength (Ghosh 1999), so |dδ/dλ| is more than δ/λ, by less than a tenth.
    expect(half / -(Math.PI / 810)).toBeGreaterThan(1);
    expect(half / -(Math.PI / 810)).toBeLessThan(1.1);
    expect(quarter).toBeCloseTo(half / 2, 12);
  });
});

describe('the plain setting', () => {
  it('is one half-wave plate alone where one makes the goal, and says so', () => {
    const question = asked({ plates: '90 180 180' });
    const plain = fewestPlates(question.question.problem);
    expect(plain.places).toEqual([1]);
    expect(plain.shortfallDeg).toBe(0);
    const { study } = studied(asked({ plates: '180 180 180', starts: '4' }));
    const [first] = listedSettings(asked({ plates: '180 180 180', starts: '4' }), study);
    if (first === undefined) throw new Error('nothing found');
    expect(plainWords(searchedDesign(question, study, first).plain)).toMatch(
      /^plate 1 alone at (?:45|135)\.00°$/u,
    );
  });

  it('is the nearest of all plates where none makes the goal', () => {
    const plain = fewestPlates(asked({ plates: '85 85' }).question.problem);
    // Along one axis they turn by 170° of the 180°; any other way by less about it.
    expect(plain.places).toEqual([0, 1]);
    expect(plain.shortfallDeg).toBeCloseTo(10, 6);
  });

  it('at a bench has all plates in the beam, as the designer sets them', () => {
    const at = bench(9, 'gate bench', [plate(1, 'Q-1', 90), plate(2, 'H-1', 180), plate(3, 'Q-2', 90)]);
    const question = asked({ benchId: id(9), starts: '1' }, at);
    const { study } = studied(question);
    expect(study.plain.kind).toBe('bench');
    expect(study.plain.plates).toHaveLength(3);
    expect(study.found.plain?.infidelityAtZero).toBeLessThan(1e-20);
  });
});

describe('a study', () => {
  const question = asked({ starts: '6' });
  const { study, shares } = studied(question);
  const settings = listedSettings(question, study);

  it('tells its progress, never backwards, to the end', () => {
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares).toHaveLength(7);
    expect(shares.at(-1)).toBe(1);
  });

  it('finds for three half-wave plates what Pancharatnam’s condition says, 60° between the plates', () => {
    for (const { fastAxesDeg, robustness, dialsDeg } of settings) {
      const [a = NaN, b = NaN, c = NaN] = fastAxesDeg;
      expect(a).toBeCloseTo(c, 5);
      expect(Math.abs(Math.cos((2 * (b - a) * Math.PI) / 180))).toBeCloseTo(0.5, 6);
      expect(effectWords(robustness)).toBe('cancels first order');
      expect(dialsDeg).toBeNull();
    }
    expect(settings.length).toBeGreaterThan(0);
  });

  it('draws the setting in ε⁴ and the plain one in ε², and where they leave the tolerance', () => {
    const [first] = settings;
    if (first === undefined) throw new Error('nothing found');
    const design = searchedDesign(question, study, first);
    expect(powerOf(design, 'composite')?.power).toBeCloseTo(4, 1);
    expect(powerOf(design, 'plain')?.power).toBeCloseTo(2, 1);
    const curves = drawnCurves(design);
    // The plain half-wave plate: ⅔ sin²(πε/2) = 10⁻³ at ε = (2/π) asin √(1.5 · 10⁻³).
    const edge = (2 / Math.PI) * Math.asin(Math.sqrt(1.5e-3));
    expect(heldOver(curves, 'plain', 1e-3)?.to).toBeCloseTo(edge, 4);
    expect(heldOver(curves, 'plain', 1e-3)?.from).toBeCloseTo(-edge, 4);
    expect(heldOver(curves, 'composite', 1e-3)?.to).toBeGreaterThan(5 * edge);
  });

  it('copies as plain ASCII, one plate a line', () => {
    const [first] = settings;
    if (first === undefined) throw new Error('nothing found');
    const text = copiedText(searchedDesign(question, study, first), DEFAULT_CONVENTION);
    expect(text).toMatch(/^[\x20-\x7e\n]+$/u);
    expect(text).toContain(
      `plate 1: retardance 180 deg, fast axis ${first.fastAxesDeg[0]?.toFixed(2) ?? ''} deg`,
    );
    expect(text).toContain('written in: phase kz - wt, hands as the receiver sees them, +S3 is L');
    expect(text).toContain('these angles meet the goal at no error');
    expect(text).not.toMatch(/dial/u);
    expect(text.split('\n')).toHaveLength(8);
  });
});

describe('a bench’s dials', () => {
  it('are the table angle on each mount’s scale, and rounding them is said', () => {
    const at = bench(9, 'arm', [plate(1, 'H-1', 180), plate(2, 'H-2', 180), plate(3, 'H-3', 180)]);
    const question = asked({ benchId: id(9), starts: '6' }, at);
    const { study } = studied(question);
    const [first] = listedSettings(question, study);
    if (first === undefined) throw new Error('nothing found');
    first.dialsDeg?.forEach((dial, k) => {
      // Offset 10°, numbers counter-clockwise: the dial is θ + 10° or half a turn more.
      const apart = (dial - (first.fastAxesDeg[k] ?? NaN) - 10) % 180;
      expect(Math.min(Math.abs(apart), 180 - Math.abs(apart))).toBeLessThanOrEqual(0.05 + 1e-9);
    });
    expect(first.dialsDeg).toHaveLength(3);
    const design = searchedDesign(question, study, first);
    expect(dialledInfidelity(design)).toBeLessThan(1e-4);
    const text = copiedText(design, DEFAULT_CONVENTION);
    expect(text).toContain(', dial ');
    expect(text).toContain(`these dials at no error: 1 - F ${infidelityAscii(dialledInfidelity(design))}\n`);
  });
});

describe('published composites', () => {
  it.each(PUBLISHED_COMPOSITES.map((composite) => [composite.id, composite] as const))(
    '%s is drawn with its own power, and does better than its plain counterpart',
    (_, composite) => {
      const design = publishedDesign(composite, 0.1);
      if (composite.infidelityPower !== null) {
        const measured = powerOf(design, 'composite');
        expect(wholePower(measured?.power ?? NaN)).toBe(composite.infidelityPower);
        expect(design.meetsGoal).toBe(true);
      }
      expect(wholePower(powerOf(design, 'plain')?.power ?? NaN)).toBe(2);
      expect(design.plain.robustness.infidelityAtZero).toBeLessThan(1e-20);
      expect(design.robustness.averageInfidelity).toBeLessThan(design.plain.robustness.averageInfidelity / 3);
    },
  );

  it('a flat retardance is held against one plate along its own axis at no error', () => {
    const composite = PUBLISHED_COMPOSITES.find(({ id: name }) => name === 'quarter-wave-three');
    if (composite === undefined) throw new Error('not there');
    const { plain } = publishedDesign(composite, 0.1);
    const [one] = plain.plates;
    expect(one?.retardanceRad).toBeCloseTo(toRadians(degrees(90)), 12);
    expect(plain.names).toEqual(['one plate of 90°']);
  });
});

describe('powers and ranges', () => {
  it('measures the power that a curve falls with, nearer to no error where the next terms disturb it', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 4 }),
        fc.double({ min: 0.1, max: 10, noNaN: true }),
        (half, scale) => {
          const measured = measuredPower((error) => scale * error ** (2 * half) * (1 + error), 0.1);
          expect(wholePower(measured?.power ?? NaN)).toBe(2 * half);
        },
      ),
    );
    const disturbed = measuredPower((error) => 1e-4 * error ** 2 + error ** 4, 0.1);
    expect(wholePower(disturbed?.power ?? NaN)).toBe(2);
    expect(disturbed?.near).toBeLessThan(0.01);
  });

  it('measures nothing where only rounding is left', () => {
    expect(measuredPower(() => 1e-31, 0.1)).toBeNull();
  });

  it('finds the ends of the tolerance between points, and none where it fails in the middle', () => {
    const points = [-2, -1, 0, 1, 2].map((error) => ({ error, infidelity: 10 ** (Math.abs(error) * 2 - 4) }));
    const held = withinTolerance(points, 1e-3);
    expect(held?.from).toBeCloseTo(-0.5, 12);
    expect(held?.to).toBeCloseTo(0.5, 12);
    expect(withinTolerance(points, 1)).toEqual({ from: -2, to: 2 });
    expect(withinTolerance(points, 1e-5)).toBeNull();
  });
});

describe('the axis of 1 − F', () => {
  it('holds the worst value and the tolerance, better up, with few enough numbers', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -15, max: 0, noNaN: true }),
        fc.double({ min: -15, max: 0, noNaN: true }),
        fc.double({ min: -9, max: -0.3, noNaN: true }),
        (worst, better, tolerance) => {
          const axis = infidelityAxis({
            worst: 10 ** worst,
            better: 10 ** better,
            tolerance: 10 ** tolerance,
          });
          expect(axis.numbered.length).toBeLessThanOrEqual(8);
          expect(axis.numbered.length).toBeGreaterThan(0);
          for (const value of [10 ** worst, 10 ** tolerance]) {
            expect(shareOfAxis(axis, value)).toBeGreaterThanOrEqual(-1e-9);
          }
          expect(shareOfAxis(axis, 10 ** tolerance)).toBeLessThanOrEqual(1);
          expect(shareOfAxis(axis, 1e-3)).toBeLessThan(shareOfAxis(axis, 1e-4));
        },
      ),
    );
  });

  it('keeps labels apart and in their order', () => {
    const placed = apartLabels([100, 101, 99], 17, [30, 300]);
    expect([...placed].sort((a, b) => a - b)).toEqual([placed[2], placed[0], placed[1]]);
    expect(Math.abs((placed[1] ?? 0) - (placed[0] ?? 0))).toBeGreaterThanOrEqual(17);
    expect(Math.max(...apartLabels([299, 300, 300], 17, [30, 300]))).toBe(300);
  });
});

describe('words', () => {
  it('say how often better, or worse', () => {
    expect(ratioWords(1e-4, 1.2e-3)).toBe('12 times better');
    expect(ratioWords(1e-3, 3.4e-3)).toBe('3.4 times better');
    expect(ratioWords(1e-3, 1e-3)).toBe('the same');
    expect(ratioWords(2e-3, 1e-3)).toBe('2.0 times worse');
    expect(ratioWords(1e-9, 1e-2)).toBe('more than a million times better');
    expect(ratioWords(1e-7, 1.234e-3)).toBe('12\u202f000 times better');
  });

  it('say an error with its unit and a true minus', () => {
    expect(errorWords(-0.05, 'retardance')).toBe('−5\u202f%');
    expect(errorWords(0.4, 'wavelength')).toBe('0.4\u202fnm');
  });
});
