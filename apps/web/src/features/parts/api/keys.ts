export const partsKey = (projectId: string) => ['parts', projectId] as const;
export const partKey = (partId: string) => ['part', partId] as const;
