export { findLab, holdLab, insertLab, type StoredLab } from './lab-store';
export { labRoutes } from './routes';
