export { OpenQuestionRisks, OpenQuestionWarnings } from './OpenQuestionWarnings';
export { ShortHash } from './ShortHash';
export { labVersionsQuery, versionQuery } from './queries';
