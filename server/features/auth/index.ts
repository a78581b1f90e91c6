export { sessionRoutes } from './session-routes';
