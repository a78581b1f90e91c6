export { homeQuery } from './queries';
