import type { Action } from '../../../shared/permissions';

const tasks: Readonly<Record<string, { readonly needs: Action; readonly sentence: string }>> = {
  add: { needs: 'cabinet.write', sentence: 'Plates are added by designers and leads' },
  edit: { needs: 'cabinet.write', sentence: 'Plates are edited by designers and leads' },
  calibrate: {
    needs: 'calibrations.record',
    sentence: 'Calibrations are recorded by operators, designers and leads',
  },
};

/** Who may do what `?do=` asks for, said to a person who may not; null where nothing is refused. */
export function whoMay(task: string | null, may: (action: Action) => boolean): string | null {
  const asked = task === null || !Object.hasOwn(tasks, task) ? undefined : tasks[task];
  return asked === undefined || may(asked.needs) ? null : asked.sentence;
}
