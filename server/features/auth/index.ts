export { sessionHandler } from './session';
export { sessionRoutes } from './session-routes';
export { SessionStore } from './session-store';
export { signInRoutes, toSignIn } from './sign-in';
