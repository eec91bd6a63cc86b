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

function Outcome({ inertiaKgM2, drive }: { inertiaKgM2: number; drive: Drive }) {
  return (
    <dl className="facts drive-outcome">
      <div className="fact">
        <dt>Torque</dt>
        <dd>
          <b>
            <Shown quantity="torque" value={computeTorque(inertiaKgM2, drive)} />
          </b>{' '}
          <span className="soft">for this part alone, at an even acceleration from rest; friction, load and the rest of the drive come on top</span>
        </dd>
      </div>
      <div className="fact">
        <dt>Stored energy</dt>
        <dd>
          <b>
            <Shown quantity="energy" value={computeStoredEnergy(inertiaKgM2, drive.speedRadPerS)} />
          </b>{' '}
          <span className="soft">at that speed</span>
        </dd>
      </div>
    </dl>
  );
}

interface DriveFieldsProps {
  drive: Drive | null;
  inertiaKgM2: number;
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
  // One field that is still empty is not yet a mistake.
  const error = (texts.speed.trim() !== '' && read.speedError) || (texts.time.trim() !== '' && read.timeError);
  return (
    <>
      <div className="drive-fields">
        <span>From rest to</span>
        <span className="drive-field">
          <NumberInput label="Speed in r/min" text={texts.speed} error={texts.speed.trim() === '' ? undefined : read.speedError} onChange={(speed) => commit({ ...texts, speed })} />
          <span className="unit">r/min</span>
        </span>
        <span>in</span>
        <span className="drive-field">
          <NumberInput label="Time in s" text={texts.time} error={texts.time.trim() === '' ? undefined : read.timeError} width={84} onChange={(time) => commit({ ...texts, time })} />
          <span className="unit">s</span>
        </span>
      </div>
      {error && (
        <p role="status" className="field-error">
          {error}
        </p>
      )}
      {drive && <Outcome inertiaKgM2={inertiaKgM2} drive={drive} />}
    </>
  );
}
