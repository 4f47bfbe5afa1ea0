export const project = {} as const;
