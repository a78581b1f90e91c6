import type { ScanColumns } from '../../shared/schemas';

/**
 * The file of a scan of Q-E between polarisers, as a lab's program writes one. Invented: a plate of 89.2° whose zero is at 8.95,
 * read in both ports with 0.6 % of the power as noise.
 */
export const scanOfQE: { readonly name: string; readonly columns: ScanColumns; readonly text: string } = {
  name: 'q-e-780nm.csv',
  columns: {
    dial: { column: 0, unit: null },
    crossed: { column: 1, unit: null },
    parallel: { column: 2, unit: null },
    crossedSigma: null,
    parallelSigma: null,
  },
  text: `# plate Q-E in M10, 780 nm, power meters behind the cube
dial (deg);crossed (mW);parallel (mW)
300;0.4120;1.4308
307;0.6243;1.2043
314;0.7930;1.0375
321;0.9007;0.9716
328;0.8860;0.9544
335;0.7616;1.0642
342;0.5974;1.2598
349;0.3754;1.4770
356;0.1765;1.6791
3;0.0185;1.8045
10;0.0079;1.8411
17;0.0805;1.7778
24;0.2304;1.6262
31;0.4631;1.4162
38;0.6513;1.1793
45;0.8253;0.9964
52;0.8764;0.9378
59;0.8911;0.9678
66;0.7473;1.0914
73;0.5524;1.2795
80;0.3575;1.4953
87;0.1358;1.6834
94;0.0317;1.8117
101;0.0142;1.8345
108;0.0812;1.7476
115;0.2529;1.5789
122;0.4688;1.3759
129;0.6848;1.1614
136;0.8344;0.9976
143;0.9122;0.9516
150;0.8836;0.9849
`,
};
