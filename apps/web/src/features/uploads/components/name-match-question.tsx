import { Button, HTMLSelect, InputGroup } from '@blueprintjs/core';
import { useId, useState } from 'react';
import { countOf } from '../../../lib/plural';
import { proposeParts } from '../model/name-matches';
import { nextLetter } from '../model/next-letter';
import type { Decision, UploadEntry } from '../model/upload-entry';
import { decideUploads } from '../model/upload-queue';

const asNew = 'part';

/** What a person chooses for one file: a part's next revision, or a part of its own. */
function MatchRow({ entry, reason, onDecided }: { entry: UploadEntry; reason: string; onDecided: () => void }) {
  const matches = entry.matches ?? [];
  const [choice, setChoice] = useState(matches[0]?.partId ?? asNew);
  const match = matches.find(({ partId }) => partId === choice);
  const decide = (): Decision => (match ? { as: 'revision', partId: match.partId, reason } : { as: 'part' });
  return (
    <li className="match-row">
      <span className="figure file-name">{entry.fileName}</span>
      <HTMLSelect
        aria-label={`What ${entry.fileName} is`}
        value={choice}
        onChange={(event) => setChoice(event.currentTarget.value)}
        options={[
          ...matches.map((one) => ({ value: one.partId, label: `revision ${nextLetter(one.letter)} of No. ${one.number} ${one.name}` })),
          { value: asNew, label: 'a new part' },
        ]}
      />
      <Button
        size="small"
        onClick={() => {
          decideUploads([entry.key], decide);
          onDecided();
        }}
      >
        Add it so
      </Button>
      {match && !match.sameCase && <span className="soft match-note">The names differ in the case of letters: the part has {match.storedFileName}.</span>}
    </li>
  );
}

/** Files whose names parts of the project have already: each may be the next revision of one, and that is for the person to say. */
export function NameMatchQuestion({ entries }: { entries: readonly UploadEntry[] }) {
  const [reason, setReason] = useState('');
  const reasonId = useId();
  const keys = entries.map(({ key }) => key);
  const proposed = proposeParts(entries);
  const nextRevision = ({ key }: UploadEntry): Decision => {
    const partId = proposed.get(key);
    return partId === undefined ? { as: 'part' } : { as: 'revision', partId, reason };
  };
  const single = entries.length === 1;
  return (
    <section className="match-question" aria-label="Files that parts have already">
      <h3>{single ? 'A part has a file of this name' : `${countOf(entries.length, 'file')} have names that parts have already`}</h3>
      <p className="soft">
        Added as the next revision, {single ? 'it takes' : 'each takes'} unit, density and axis of the one before; a weighed mass is not taken over. Until you decide, {single ? 'it waits' : 'they wait'}.
      </p>
      <div className="match-reason">
        <label htmlFor={reasonId}>Reason for the revision</label>
        <InputGroup id={reasonId} value={reason} onValueChange={setReason} maxLength={500} placeholder="wall 0.4 mm thicker at the boss" />
      </div>
      <p className="match-all">
        <Button intent="primary" onClick={() => decideUploads([...proposed.keys()], nextRevision)}>
          {single ? 'Next revision' : proposed.size === entries.length ? 'Next revisions, all of them' : `Next revisions, ${proposed.size} of them`}
        </Button>
        <Button onClick={() => decideUploads(keys, () => ({ as: 'part' }))}>{single ? 'A new part' : 'New parts, all of them'}</Button>
      </p>
      {(!single || (entries[0]?.matches?.length ?? 0) > 1 || entries[0]?.matches?.[0]?.sameCase === false) && (
        <ul className="match-list">
          {entries.map((entry) => (
            // The reason of one revision is not that of the next.
            <MatchRow key={entry.key} entry={entry} reason={reason} onDecided={() => setReason('')} />
          ))}
        </ul>
      )}
    </section>
  );
}
