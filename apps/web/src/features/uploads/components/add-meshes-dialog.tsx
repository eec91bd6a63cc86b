import { Button, Dialog, DialogFooter, InputGroup } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { useId, useState, type DragEvent } from 'react';
import { Notice } from '../../../components/notice';
import { collectDrop } from '../../../lib/dropped-files';
import { formatBytes } from '../../../lib/format-bytes';
import { countOf } from '../../../lib/plural';
import { useStorageUse } from '../api/uploads';
import { closeUploadDialog, leaveOthersOut, setReplacementReason, takeFiles, takeOthers, useUploadDialog, type OpenReplacement } from '../model/dialog-state';
import { isRefusal } from '../model/quick-figures';
import { awaitsDecision, type UploadEntry } from '../model/upload-entry';
import { tellServer, useStatingProblem, useUploads } from '../model/upload-queue';
import { lacksUnit, summariseUploads } from '../model/upload-summary';
import { useTick } from '../model/use-tick';
import { FilePicker } from './file-picker';
import { NameMatchQuestion } from './name-match-question';
import { UnitPanel } from './unit-panel';
import { UploadList } from './upload-list';
import { UploadTotals } from './upload-totals';
import './uploads.css';

interface AddMeshesDialogProps {
  projectId: string;
  /** The library, for the question of what the meshes are made of. */
  materials: readonly Material[];
}

/** Where a project's page puts it; it opens by `openUploadDialog`. Files are sent from the moment in which they are dropped; what they are is asked meanwhile. */
export function AddMeshesDialog({ projectId, materials }: AddMeshesDialogProps) {
  const dialog = useUploadDialog();
  const isOpen = dialog?.projectId === projectId;
  const drop = (event: DragEvent): void => {
    event.preventDefault();
    void collectDrop(event.dataTransfer).then(({ files, unreadable }) => takeFiles(files, unreadable));
  };
  return (
    <Dialog title={dialog?.replacement ? `New file for No. ${dialog.replacement.number} ${dialog.replacement.name}` : 'Add meshes'} isOpen={isOpen} onClose={closeUploadDialog} className="add-meshes" canOutsideClickClose={false}>
      {isOpen && (
        <div className="add-meshes-drop" onDragOver={(event) => event.preventDefault()} onDrop={drop}>
          <Body projectId={projectId} materials={materials} others={dialog.others.length} excess={dialog.excess} unreadable={dialog.unreadable} replacement={dialog.replacement} />
        </div>
      )}
    </Dialog>
  );
}

interface BodyProps extends AddMeshesDialogProps {
  others: number;
  excess: string | undefined;
  unreadable: readonly string[];
  replacement: OpenReplacement | undefined;
}

/** What is to be done in the dialog, in this order; the first that wants the person is shown, unless they look at another. */
const steps = ['unit', 'names', 'files'] as const;
type Step = (typeof steps)[number];

function Body({ projectId, materials, others, excess, unreadable, replacement }: BodyProps) {
  const all = useUploads();
  const entries = all.filter((entry) => entry.projectId === projectId);
  const [postponed, setPostponed] = useState<ReadonlySet<string>>(new Set());
  // Asked about together: files that are one drop's question stay in it until it is answered, also when their unit is chosen one by one.
  const [asking, setAsking] = useState<ReadonlySet<string>>(new Set());
  const [looksAt, setLooksAt] = useState<Step>();
  const isAskable = (entry: UploadEntry): boolean => !isRefusal(entry.quick) && !awaitsDecision(entry) && entry.phase !== 'cancelled' && (entry.phase !== 'present' || entry.part?.lengthUnit === null) && entry.decision?.as !== 'revision' && entry.part?.run.state !== 'failed';
  const fresh = entries.filter((entry) => isAskable(entry) && lacksUnit(entry) && !postponed.has(entry.key) && !asking.has(entry.key));
  if (fresh.length > 0) setAsking(new Set([...asking, ...fresh.map(({ key }) => key)]));
  const asked = replacement ? [] : entries.filter((entry) => asking.has(entry.key) && isAskable(entry));
  const undecided = entries.filter(awaitsDecision);
  const wanted: Step = asked.length > 0 ? 'unit' : undecided.length > 0 ? 'names' : 'files';
  const counts: Record<Step, number> = { unit: asked.length, names: undecided.length, files: entries.length };
  const step = looksAt && counts[looksAt] > 0 ? looksAt : wanted;
  const settle = (): void => {
    setPostponed(new Set([...postponed, ...asked.map(({ key }) => key)]));
    setAsking(new Set());
    setLooksAt(undefined);
  };
  const showsPicker = entries.length === 0 || replacement !== undefined;
  return (
    <>
      <div className="bp6-dialog-body add-meshes-body">
        {excess && <Notice tone="wrong">{excess}</Notice>}
        {unreadable.length > 0 && <Notice tone="wrong">The browser could not read {unreadable.join(', ')}. Nothing of {unreadable.length === 1 ? 'it' : 'them'} was sent; look whether {unreadable.length === 1 ? 'it is' : 'they are'} still there and may be read, then drop again.</Notice>}
        {others > 0 && <Others count={others} />}
        {replacement && <ReplacementReason reason={replacement.reason} />}
        {showsPicker && <FilePicker onFiles={takeFiles} single={replacement !== undefined} />}
        {entries.length > 0 && <Progress entries={entries} />}
        {entries.length > 0 && <StepBar step={step} counts={counts} onStep={setLooksAt} />}
        {step === 'unit' && <UnitPanel entries={asked} materials={materials} onAnswered={settle} />}
        {step === 'names' && <NameMatchQuestion entries={undecided} />}
        <StatingProblem projectId={projectId} />
        {step === 'files' && entries.length > 0 && <Files entries={entries} />}
      </div>
      <DialogFooter
        actions={
          <>
            {!showsPicker && <FilePicker onFiles={takeFiles} small />}
            <Button onClick={closeUploadDialog}>Close</Button>
          </>
        }
      >
        <FooterWords entries={entries} />
      </DialogFooter>
    </>
  );
}

function ReplacementReason({ reason }: { reason: string }) {
  const id = useId();
  return (
    <div className="match-reason">
      <label htmlFor={id}>Reason for the revision</label>
      <InputGroup id={id} value={reason} onValueChange={setReplacementReason} maxLength={500} placeholder="exported anew, with the whole flange" autoFocus />
    </div>
  );
}

const stepTexts: Record<Step, (count: number) => string> = {
  unit: () => 'Unit and material',
  names: (count) => `Names that parts have, ${count}`,
  files: (count) => `Files, ${count}`,
};

function StepBar({ step, counts, onStep }: { step: Step; counts: Record<Step, number>; onStep: (step: Step) => void }) {
  const shown = steps.filter((one) => counts[one] > 0);
  if (shown.length < 2) return null;
  return (
    <nav className="step-bar" aria-label="What is to be answered">
      {shown.map((one) => (
        <button key={one} type="button" className="step-bar-step" aria-current={one === step ? 'step' : undefined} onClick={() => onStep(one)}>
          {stepTexts[one](counts[one])}
        </button>
      ))}
    </nav>
  );
}

function Progress({ entries }: { entries: readonly UploadEntry[] }) {
  const summary = summariseUploads(entries);
  const tick = useTick(summary.sending > 0);
  return <UploadTotals entries={entries} summary={summary} tick={tick} />;
}

function Others({ count }: { count: number }) {
  return (
    <p className="others-line">
      <span className="soft">
        {countOf(count, 'file')} that {count === 1 ? 'is no mesh by its name was' : 'are no meshes by their names were'} left out.
      </span>
      <Button size="small" onClick={takeOthers}>
        Send {count === 1 ? 'it' : 'them'} all the same
      </Button>
      <Button size="small" variant="minimal" onClick={leaveOthersOut}>
        Dismiss
      </Button>
    </p>
  );
}

function StatingProblem({ projectId }: { projectId: string }) {
  const problem = useStatingProblem();
  if (problem?.projectId !== projectId) return null;
  return (
    <Notice tone="wrong">
      What you stated could not be saved: {problem.sentence}{' '}
      <Button size="small" onClick={() => tellServer(projectId)}>
        Try again
      </Button>
    </Notice>
  );
}

function Files({ entries }: { entries: readonly UploadEntry[] }) {
  const tick = useTick(entries.some((entry) => entry.phase === 'sending'));
  return <UploadList entries={entries} tick={tick} />;
}

function FooterWords({ entries }: { entries: readonly UploadEntry[] }) {
  const { data: use } = useStorageUse();
  const { sending, undecided } = summariseUploads(entries);
  if (undecided > 0) return <span className="soft">{countOf(undecided, 'file')} {undecided === 1 ? 'wants' : 'want'} your decision.</span>;
  if (sending > 0) return <span className="soft">You can close this: they go on being sent.</span>;
  if (entries.length > 0) return <span className="soft">All are sent.</span>;
  return use ? <span className="soft">{formatBytes(use.usedBytes)} of {formatBytes(use.limitBytes)} used; one file may have {formatBytes(use.largestFileBytes)}.</span> : null;
}
