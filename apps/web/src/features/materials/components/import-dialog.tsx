import { Button, Dialog, DialogFooter } from '@blueprintjs/core';
import type { ImportMaterialsAnswer } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { useRef, useState } from 'react';
import { Notice } from '../../../components/notice';
import { ProblemNotice } from '../../../components/problem-notice';
import { countOf } from '../../../lib/plural';
import { useImportMaterials } from '../api/materials';

const mostCharacters = 2_000_000;

interface Chosen {
  name: string;
  csv: string;
}

export function ImportDialog({ isOpen, onClose }: { isOpen: boolean; onClose: () => void }) {
  return (
    <Dialog title="Materials from a table" isOpen={isOpen} onClose={onClose}>
      {isOpen && <ImportSteps onClose={onClose} />}
    </Dialog>
  );
}

/** What the rows come to, and what is wrong with which. */
function Outcome({ answer, isDone }: { answer: ImportMaterialsAnswer; isDone: boolean }) {
  const { added, changed, unchanged, errors } = answer;
  return (
    <>
      <p role="status">
        {isDone ? 'Taken: ' : ''}
        {formatCount(added)} new, {formatCount(changed)} changed, {formatCount(unchanged)} as {unchanged === 1 ? 'it is' : 'they are'} already
        {errors.length > 0 && `, ${countOf(errors.length, 'error')}`}.
      </p>
      {errors.length > 0 && <p className="soft">Rows are numbered as in the file: the header is row 1.</p>}
      {errors.length > 0 && (
        <div className="table-frame import-errors" role="region" aria-label="Errors" tabIndex={0}>
          <table className="table">
            <thead>
              <tr>
                <th scope="col" className="numeric">
                  Row
                </th>
                <th scope="col">Column</th>
                <th scope="col">What is wrong</th>
              </tr>
            </thead>
            <tbody>
              {errors.map(({ row, column, message }, index) => (
                <tr key={`${row} ${column ?? ''} ${index}`}>
                  <td className="numeric figure">{formatCount(row)}</td>
                  <td className="figure">{column ?? '–'}</td>
                  <td>{message}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
    </>
  );
}

/** Choose a file; see what it would do; take the rows that are good. Nothing is changed before that. */
function ImportSteps({ onClose }: { onClose: () => void }) {
  const input = useRef<HTMLInputElement>(null);
  const [chosen, setChosen] = useState<Chosen>();
  const [unreadable, setUnreadable] = useState<string>();
  const rehearsal = useImportMaterials();
  const taking = useImportMaterials();
  const choose = async (file: File): Promise<void> => {
    rehearsal.reset();
    taking.reset();
    setUnreadable(undefined);
    setChosen(undefined);
    try {
      const csv = await file.text();
      if (csv.length > mostCharacters) {
        setUnreadable(`${file.name} has ${formatCount(csv.length)} characters; a table of materials has at most ${formatCount(mostCharacters)}.`);
        return;
      }
      setChosen({ name: file.name, csv });
      rehearsal.mutate({ csv, rehearse: true });
    } catch {
      setUnreadable(`${file.name} could not be read from the disk.`);
    }
  };
  const answer = taking.data ?? rehearsal.data;
  const good = answer ? answer.added + answer.changed : 0;
  return (
    <>
      <div className="bp6-dialog-body import-body">
        <p>
          A CSV file with the columns <code>name</code>, <code>group</code> (or <code>family</code>), <code>density_kg_m3</code>, <code>spread_kg_m3</code>, <code>spread_basis</code> and <code>source</code>, as the export
          writes it; or <code>density</code> with a unit in each cell. Own materials of the same name are changed.
        </p>
        <div className="import-choice">
          <input
            ref={input}
            type="file"
            accept=".csv,text/csv,text/plain"
            className="hidden-visually"
            tabIndex={-1}
            aria-label="Table of materials"
            onChange={(event) => {
              const file = event.currentTarget.files?.[0];
              if (file) void choose(file);
              event.currentTarget.value = '';
            }}
          />
          <Button autoFocus onClick={() => input.current?.click()} loading={rehearsal.isPending}>
            {chosen ? 'Choose another file' : 'Choose a file'}
          </Button>
          {chosen && <span className="figure">{chosen.name}</span>}
        </div>
        {unreadable && (
          <Notice tone="wrong" live>
            <p>{unreadable}</p>
          </Notice>
        )}
        {(rehearsal.error ?? taking.error) && <ProblemNotice error={rehearsal.error ?? taking.error} />}
        {answer && <Outcome answer={answer} isDone={taking.isSuccess} />}
      </div>
      <DialogFooter
        actions={
          taking.isSuccess ? (
            <Button intent="primary" onClick={onClose}>
              Close
            </Button>
          ) : (
            <>
              <Button onClick={onClose}>Cancel</Button>
              <Button intent="primary" disabled={!chosen || good === 0} loading={taking.isPending} onClick={() => chosen && taking.mutate({ csv: chosen.csv, rehearse: false })}>
                {good > 0 ? `Take ${countOf(good, 'good row')}` : 'Take the good rows'}
              </Button>
            </>
          )
        }
      >
        {answer && !taking.isSuccess && <span className="soft">{answer.errors.length > 0 ? 'Rows with an error are left out.' : 'Nothing is changed yet.'}</span>}
      </DialogFooter>
    </>
  );
}
