export { OpenQuestionRisks, OpenQuestionWarnings } from './OpenQuestionWarnings';
export { ShortHash } from './ShortHash';
export { labVersionsQuery, protocolVersionsQuery, versionQuery } from './queries';
