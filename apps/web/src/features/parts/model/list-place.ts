/** Where a person was in a list when they left it: they come back to it from a part. */
export interface ListPlace {
  /** The filter and order that the place belongs to. */
  query: string;
  offset: number;
  current: number;
}

const places = new Map<string, ListPlace>();

export function keepPlace(projectId: string, place: ListPlace): void {
  places.set(projectId, place);
}

export function findPlace(projectId: string, query: string): ListPlace {
  const place = places.get(projectId);
  return place?.query === query ? place : { query, offset: 0, current: 0 };
}
