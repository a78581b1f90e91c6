export { findProtocol, insertProtocol, updateDraft } from './draft-store';
export { protocolRoutes } from './routes';
export { findVersion, findVersionById, insertVersion } from './version-store';
