export const gallery = {} as const;
