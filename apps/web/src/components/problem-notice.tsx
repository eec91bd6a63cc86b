import { Button } from '@blueprintjs/core';
import { getSentence } from '../lib/problem';
import { Notice } from './notice';

/** Why something failed, in the sentence that the api gave, and a way to try again where there is one. */
export function ProblemNotice({ error, onRetry }: { error: unknown; onRetry?: () => void }) {
  return (
    <Notice tone="wrong" live>
      <p>{getSentence(error)}</p>
      {onRetry && (
        <Button size="small" onClick={onRetry}>
          Try again
        </Button>
      )}
    </Notice>
  );
}
