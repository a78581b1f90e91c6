export { runsQuery } from './queries';
export { runHref, runProgressWords } from './run-words';
