export const unpack = {} as const;
