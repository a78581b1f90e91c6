export { protocolRoutes } from './routes';
export { findVersionById, type StoredVersion } from './version-store';
