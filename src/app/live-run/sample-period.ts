/**
 * Control period of every stand that is shown [s]: tick and row r lie at r × this. Documents with another period are
 * not shown yet.
 */
export const SAMPLE_S = 0.01;
