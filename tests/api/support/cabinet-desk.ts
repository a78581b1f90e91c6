import {
  type CabinetPlate,
  cabinetPlateSchema,
  plateDetailSchema,
  problemSchema,
} from '../../../shared/schemas';
import { answered, call } from './calls';
import type { Agent, Harness } from './harness';
import { plateBody } from './lab';

/** One person at the cabinet of one lab. */
export class CabinetDesk {
  constructor(
    private readonly harness: Harness,
    private readonly person: Agent,
    private readonly labId: string,
  ) {}

  at(path: string): string {
    return `/labs/${this.labId}${path}`;
  }

  async plateNow(plateId: string): Promise<CabinetPlate> {
    const answer = call(this.harness, this.person, 'get', this.at(`/plates/${plateId}`));
    return (await answered(answer, plateDetailSchema)).plate;
  }

  /** As somebody does who has just looked at the plate. */
  async change(plateId: string, method: 'put' | 'post', path: string, body: unknown) {
    const { revision } = await this.plateNow(plateId);
    return call(this.harness, this.person, method, this.at(`/plates/${plateId}${path}`), {
      body,
      ifMatch: `"r${revision}"`,
    });
  }

  async addPlate(name: string): Promise<CabinetPlate> {
    const answer = call(this.harness, this.person, 'post', this.at('/plates'), { body: plateBody(name) });
    return answered(answer, cabinetPlateSchema);
  }
}

export function faultOf(text: string) {
  const problem = problemSchema.parse(JSON.parse(text));
  return { code: problem.type.split(':').at(-1), path: problem.fields?.[0]?.path, detail: problem.detail };
}
