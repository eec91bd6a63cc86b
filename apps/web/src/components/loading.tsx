/** A quiet place-holder that is only seen when an answer takes longer than a moment. */
export function Loading({ what }: { what: string }) {
  return (
    <div className="loading" role="status">
      <span className="loading-beam" aria-hidden="true" />
      <span>Reading {what}</span>
    </div>
  );
}
