export { LabContext, useLab } from './lab-context';
export { labQuery } from './queries';
