export { sessionQuery, signInHref, signOut } from './queries';
