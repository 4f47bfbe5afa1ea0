export const chart = {} as const;
