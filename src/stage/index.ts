export { BeamLineStage } from './BeamLineStage';
export { type StageData, type StagePlate, turnedByHand } from './stage-data';
