/** prepare: make this state. analyse: pass it to a polariser at H and block its opposite. apply: be this unitary. */
export type Question = 'prepare' | 'analyse' | 'apply';
