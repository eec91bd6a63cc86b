import type { Drive } from '@masswright/contracts';
import { computeStoredEnergy, computeTorque } from '@masswright/mechanics';
import { fromSi, type Quantity } from '@masswright/units';
import { useState } from 'react';
import { Figure } from '../../../components/figure';
import { NumberInput } from '../../../components/number-input';
import { chooseDisplayUnit } from '../model/display-units';
import { isSameDrive } from '../model/setting-difference';
import { readDrive, writeDrive, type DriveTexts } from '../model/typed-drive';

const digits = 5;

function Shown({ quantity, value }: { quantity: Quantity; value: number }) {
  const unit = chooseDisplayUnit(quantity, value);
  return <Figure value={fromSi(value, unit)} unit={unit.symbol} digits={digits} />;
}

/** What a drive comes to; dashes while there is none, or no moment, that the figures could belong to. */
function Outcome({ inertiaKgM2, drive }: { inertiaKgM2: number | undefined; drive: Drive | null }) {
  const figures =
    drive && inertiaKgM2 !== undefined
      ? { torque: computeTorque(inertiaKgM2, drive), energy: computeStoredEnergy(inertiaKgM2, drive.speedRadPerS) }
      : undefined;
  return (
    <dl className="facts drive-outcome">
      <div className="fact">
        <dt>Torque</dt>
        <dd>
          <b>{figures ? <Shown quantity="torque" value={figures.torque} /> : '–'}</b>{' '}
          <span className="soft">for this part alone, at an even acceleration from rest; friction, load and the rest of the drive come on top</span>
        </dd>
      </div>
      <div className="fact">
        <dt>Stored energy</dt>
        <dd>
          <b>{figures ? <Shown quantity="energy" value={figures.energy} /> : '–'}</b> <span className="soft">at that speed</span>
        </dd>
      </div>
    </dl>
  );
}

interface DriveFieldsProps {
  drive: Drive | null;
  /** About the axis that is shown; none while its fields can't be read. */
  inertiaKgM2: number | undefined;
  canEdit: boolean;
  onChange: (drive: Drive | null) => void;
}

/** How hard it is to bring the part to a speed in a time, and what it then holds. */
export function DriveFields({ drive, inertiaKgM2, canEdit, onChange }: DriveFieldsProps) {
  const [shown, setShown] = useState(drive);
  const [texts, setTexts] = useState<DriveTexts>(() => writeDrive(drive));
  if (!isSameDrive(drive, shown)) {
    setShown(drive);
    setTexts(writeDrive(drive));
  }
  const read = readDrive(texts);
  const commit = (next: DriveTexts): void => {
    setTexts(next);
    const { drive: typed } = readDrive(next);
    if (typed === undefined) return;
    setShown(typed);
    onChange(typed);
  };
  if (!canEdit) {
    return drive ? (
      <>
        <p>
          From rest to <span className="figure">{texts.speed} r/min</span> in <span className="figure">{texts.time} s</span>:
        </p>
        <Outcome inertiaKgM2={inertiaKgM2} drive={drive} />
      </>
    ) : null;
  }
  const isSpeedEmpty = texts.speed.trim() === '';
  const isTimeEmpty = texts.time.trim() === '';
  // One field that is still empty is not yet a mistake.
  const error = (!isSpeedEmpty && read.speedError) || (!isTimeEmpty && read.timeError);
  return (
    <>
      <div className="drive-fields">
        <span>From rest to</span>
        <span className="drive-field">
          <NumberInput label="Speed in r/min" text={texts.speed} error={isSpeedEmpty ? undefined : read.speedError} onChange={(speed) => commit({ ...texts, speed })} />
          <span className="unit">r/min</span>
        </span>
        <span>in</span>
        <span className="drive-field">
          <NumberInput label="Time in s" text={texts.time} error={isTimeEmpty ? undefined : read.timeError} width={84} onChange={(time) => commit({ ...texts, time })} />
          <span className="unit">s</span>
        </span>
      </div>
      {error && (
        <p role="status" className="field-error">
          {error}
        </p>
      )}
      {!error && isSpeedEmpty !== isTimeEmpty && (
        <p role="status" className="soft">
          Give a speed and a time.
        </p>
      )}
      {/* What can be read is the drive at once; while the fields can't be read, the drive is still the one before them. */}
      {!(isSpeedEmpty && isTimeEmpty) && <Outcome inertiaKgM2={inertiaKgM2} drive={read.drive ? drive : null} />}
    </>
  );
}
