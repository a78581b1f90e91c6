import type { OrderPlan, SequencePlan } from '../../../../shared/optics/sequence';
import { TextButton } from '../../../components/TextLink';
import { durationWords, turnWords } from './turn-words';

interface SequenceAnswerProps {
  readonly plan: SequencePlan;
  readonly order: OrderPlan | null;
  /** What was made least. */
  readonly cost: 'travel' | 'time';
  readonly labels: readonly string[];
  /** Whether the list is ranked by least travel already. */
  readonly ranked: boolean;
  /** Takes a plan in some order of the rows; null for somebody who may not. */
  readonly take: ((order: readonly number[], plan: SequencePlan) => void) | null;
}

interface Cost {
  readonly deg: number;
  readonly seconds: number | null;
}

/** What was made least, in its own unit. */
function amount({ deg, seconds }: Cost, cost: 'travel' | 'time'): string {
  return cost === 'time' && seconds !== null ? durationWords(seconds) : turnWords(deg);
}

const costOf = ({ travelDeg, seconds }: SequencePlan): Cost => ({ deg: travelDeg, seconds });

function less(from: Cost, to: Cost): Cost {
  return {
    deg: from.deg - to.deg,
    seconds: from.seconds === null || to.seconds === null ? null : from.seconds - to.seconds,
  };
}

/** The saving, before it is taken. */
export function SequenceAnswer({ plan, order, cost, labels, ranked, take }: SequenceAnswerProps) {
  const changes = order?.order.some((place, index) => place !== index) ?? false;
  const first = { deg: plan.firstTravelDeg, seconds: plan.firstSeconds };
  return (
    <div role="status" className="mt-3 space-y-2">
      <table className="w-full max-w-160 text-left">
        <thead className="text-s text-ink-2">
          <tr className="border-b border-hair">
            <th scope="col" className="font-words">
              way through the list
            </th>
            <th scope="col" className="text-right font-words">
              all plates turn
            </th>
            <th scope="col" className="text-right font-words">
              time
            </th>
          </tr>
        </thead>
        <tbody>
          <WayRow name="each row’s first solution" {...first} />
          <WayRow name="the best solutions in this order" {...costOf(plan)} />
          {order !== null && changes && (
            <WayRow name="the best solutions in another order" {...costOf(order.plan)} />
          )}
        </tbody>
      </table>
      <p className="m-0">
        Choosing the solutions saves {amount(less(first, costOf(plan)), cost)} against each row’s first.{' '}
        {cost === 'travel' && ranked && 'The list is ranked so.'}
        {take !== null && !(cost === 'travel' && ranked) && (
          <TextButton
            onClick={() =>
              take(
                labels.map((_, place) => place),
                plan,
              )
            }
          >
            {cost === 'travel' ? 'Rank the list by least travel' : 'Hold these solutions'}
          </TextButton>
        )}
      </p>
      {order !== null && (
        <p className="m-0">
          {changes ? (
            <>
              In the order {order.order.map((place) => labels[place] ?? '').join(', ')} it saves{' '}
              {amount(less(costOf(plan), costOf(order.plan)), cost)} more. <Bound {...{ order, cost }} />{' '}
              {take !== null && (
                <TextButton onClick={() => take(order.order, order.plan)}>
                  {cost === 'travel' ? 'Take this order' : 'Take this order and hold its solutions'}
                </TextButton>
              )}
            </>
          ) : (
            'No better order was found.'
          )}
        </p>
      )}
    </div>
  );
}

/** How much better any order could be. */
function Bound({ order, cost }: { readonly order: OrderPlan; readonly cost: 'travel' | 'time' }) {
  const does = cost === 'travel' ? 'turns less' : 'takes less time';
  if (order.method === 'exact') return <>No order {does}.</>;
  const bound = cost === 'travel' ? order.boundDeg : order.boundSeconds;
  if (bound === null) return null;
  return cost === 'travel' ? (
    <>No order can turn less than {turnWords(bound)} in all.</>
  ) : (
    <>No order can take less than {durationWords(bound)} in all.</>
  );
}

function WayRow({ name, deg, seconds }: Cost & { readonly name: string }) {
  return (
    <tr className="border-b border-hair">
      <th scope="row" className="py-1 font-words">
        {name}
      </th>
      <td className="py-1 text-right font-mono">{turnWords(deg)}</td>
      <td className="py-1 text-right font-mono">{seconds === null ? '—' : durationWords(seconds)}</td>
    </tr>
  );
}
