import { render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { cleanup } from '@testing-library/react';
import { LaserCaution } from '../../../src/features/benches';
import { laserClasses } from '../../../shared/schemas/benches';

afterEach(cleanup);

describe('the laser caution', () => {
  it.each(['3R', '3B', '4', null] as const)('stands in full for class %s', (laserClass) => {
    render(<LaserCaution laserClass={laserClass} hazardWavelengthsNm={[405, 810]} variant="full" />);
    const caution = screen.getByRole('note', { name: 'Laser caution' });
    for (const words of [
      'eyewear made for 405 and 810nm',
      'table height',
      'terminate',
      'reflective tool',
      'Power down',
      'laser-safety officer',
      'IEC 60825-1',
      'site',
    ]) {
      expect(caution).toHaveProperty('textContent', expect.stringContaining(words));
    }
  });

  it('treats a class that nobody stated as one that can hurt', () => {
    render(<LaserCaution laserClass={null} hazardWavelengthsNm={[780]} variant="full" />);
    expect(screen.getByText(/not stated: take it as one that can hurt/)).toBeDefined();
  });

  it('keeps eyewear, height, reflections, power and who decides in the short form', () => {
    const { container } = render(
      <LaserCaution laserClass="3B" hazardWavelengthsNm={[780]} variant="short" />,
    );
    expect(container.textContent).toMatch(
      /Class 3B: eyewear for 780nm, beam at table height and terminated, nothing reflective.*power down.*officer.*IEC 60825-1/,
    );
  });

  it('never says that anything is safe', () => {
    for (const laserClass of [...laserClasses, null]) {
      for (const variant of ['full', 'short'] as const) {
        const { container } = render(
          <LaserCaution {...{ laserClass, variant }} hazardWavelengthsNm={[633]} />,
        );
        expect(container.textContent.replaceAll('laser-safety officer', '')).not.toMatch(
          /safe|harmless|no danger/i,
        );
        cleanup();
      }
    }
  });
});
