/** Stored with every computed volume and change; raise it when any formula in this room changes its result. */
export const FORMULA_VERSION = '1.0.0';
