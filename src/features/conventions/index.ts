export { conventionsHref } from './address';
export { flagWords } from './flag-words';
export { writtenComplex, writtenReal } from './written-numbers';
