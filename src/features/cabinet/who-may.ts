import type { Action } from '../../../shared/permissions';

interface Task {
  readonly needs: Action;
  readonly sentence: string;
}

const seats: Task = {
  needs: 'cabinet.write',
  sentence: 'Plates are seated and taken out by designers and leads',
};
const measures: Task = {
  needs: 'calibrations.record',
  sentence: 'Calibrations are recorded by operators, designers and leads',
};

const tasks: Readonly<Record<string, Task>> = {
  add: { needs: 'cabinet.write', sentence: 'Plates and mounts are added by designers and leads' },
  edit: { needs: 'cabinet.write', sentence: 'Plates and mounts are edited by designers and leads' },
  seat: seats,
  'seat-anew': seats,
  'take-out': seats,
  calibrate: measures,
  'settle-axis': measures,
  'settle-branch': measures,
};

/** Who may do what `?do=` asks for, said to a person who may not; null where nothing is refused. */
export function whoMay(task: string | null, may: (action: Action) => boolean): string | null {
  const asked = task === null || !Object.hasOwn(tasks, task) ? undefined : tasks[task];
  return asked === undefined || may(asked.needs) ? null : asked.sentence;
}
