import { blindNearDeg } from '../../../../shared/optics/calibration';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import type { Calibration, OpenQuestion } from '../../../../shared/schemas/calibrations';
import { ButtonLink } from '../../../components/Button';
import { UnsettledSign } from '../../../components/SmallSigns';
import { TextLink } from '../../../components/TextLink';
import { openQuestionWords } from './question-words';

/** What a plate's calibration could not tell, one question under the other, each with the ways to settle it. */
export function OpenQuestions(props: {
  readonly plate: CabinetPlate;
  readonly calibration: Calibration;
  readonly sinceSeat: boolean;
  /** The address of the plate's page. */
  readonly page: string;
  readonly measures: boolean;
}) {
  const { plate, calibration, sinceSeat, page, measures } = props;
  return calibration.openQuestions.map((question, index) => {
    const { head, meaning } = openQuestionWords(plate, calibration, question, sinceSeat);
    const headId = `${plate.id}-${question}`;
    return (
      <section
        key={question}
        aria-labelledby={headId}
        className={index > 0 ? 'border-ink border-t-[1.5px] pt-4' : undefined}
      >
        <div className="flex items-start gap-5">
          <UnsettledSign className="my-2 h-12 w-18" />
          <div className="min-w-0">
            <h3 id={headId} className="text-section">
              {head}
            </h3>
            <p className="mt-1">{meaning}</p>
          </div>
        </div>
        {measures && (
          <Ways
            question={question}
            retardanceDeg={calibration.retardanceDeg}
            page={page}
            first={index === 0}
          />
        )}
      </section>
    );
  });
}

const byHand: Readonly<Record<OpenQuestion, { readonly task: string; readonly words: string }>> = {
  axis: { task: 'settle-axis', words: 'record what the mark on its rim says' },
  branch: { task: 'settle-branch', words: 'record which of the two it is' },
  blind: { task: 'calibrate', words: 'record a value measured another way' },
};

function Ways(props: {
  readonly question: OpenQuestion;
  readonly retardanceDeg: number;
  readonly page: string;
  readonly first: boolean;
}) {
  const { question, retardanceDeg, page, first } = props;
  const { task, words } = byHand[question];
  // A scan between polarisers feels a retardance just where one behind circular light is blind.
  const isLinear = question === 'blind' && blindNearDeg(retardanceDeg) % 180 !== 0;
  return (
    <>
      <p className="mt-4">
        <ButtonLink
          kind={first ? 'filled' : 'outlined'}
          to={isLinear ? `${page}/scan` : `${page}/scan?light=known`}
        >
          {isLinear ? 'Scan between polarisers' : 'Scan behind circular light'}
        </ButtonLink>
      </p>
      <p className="text-ink-2 mt-4">
        or{' '}
        <TextLink to={`${page}?do=${task}`} preventScrollReset>
          {words}
        </TextLink>
      </p>
    </>
  );
}
