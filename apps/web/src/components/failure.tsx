import { isProblem } from '../lib/problem';
import { Forbidden, NotFound } from './not-found';
import { ProblemNotice } from './problem-notice';

/** In place of a page whose subject can't be read: because there is none, because it is not for this reader, or for now. */
export function Failure({ error, onRetry }: { error: unknown; onRetry: () => void }) {
  if (isProblem(error, 'not-found') || isProblem(error, 'bad-request') || isProblem(error, 'invalid-input')) return <NotFound />;
  if (isProblem(error, 'forbidden')) return <Forbidden sentence={error.problem.detail} />;
  return (
    <div className="failure">
      <ProblemNotice error={error} onRetry={onRetry} />
    </div>
  );
}
