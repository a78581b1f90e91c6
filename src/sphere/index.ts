export { FieldPlot } from './FieldPlot';
export { PathInWords } from './PathInWords';
export { pathInWords, stateInWords } from './path-words';
export type { SphereInput, SpherePlate } from './scene';
export { Sphere } from './Sphere';
export { createSphereViewStore, type SphereViewStore } from './view-store';
