export { FieldPlot } from './FieldPlot';
export { PathInWords } from './PathInWords';
export { pathInWords } from './path-words';
export type { ReachInput } from './reach-grid';
export type { SphereImage, SphereInput, SpherePlate, SpherePointInput } from './scene';
export { Sphere } from './Sphere';
export { createSphereViewStore, type SphereViewStore } from './view-store';
export { stateInWords } from './state-words';
