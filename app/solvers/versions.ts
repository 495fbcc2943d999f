/** Version of each solver: part of every result's key. Raise it whenever a result may change in any digit shown. */
export const SOLVER_VERSIONS = { halfline: 6, plane: 1, root: 1, simulation: 2 } as const;
