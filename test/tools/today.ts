/** The day that the tests take for today. */
export const TODAY = '2026-12-01';
