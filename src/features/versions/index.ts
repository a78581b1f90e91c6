export { ShortHash } from './ShortHash';
export { labVersionsQuery, versionQuery } from './queries';
