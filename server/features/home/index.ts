export { homeRoutes } from './routes';
