export { findLab, type StoredLab } from './lab-store';
export { labRoutes } from './routes';
