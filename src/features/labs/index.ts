export { LabContext, type LabContextValue, useLab } from './lab-context';
export { labQuery } from './queries';
export { roleWithArticle } from './role-words';
