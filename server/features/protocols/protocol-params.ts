import { idSchema } from '../../../shared/schemas';
import { labParams } from '../../http/lab-params';

export const protocolParams = labParams.extend({ protocolId: idSchema });
