import type { Axis, Vector3 } from '@masswright/contracts';
import { fromSi, toSi } from '@masswright/units';
import { useState } from 'react';
import { NumberInput } from '../../../components/number-input';
import { readNumber, writeNumber } from '../../../lib/typed-number';
import { isSameAxis } from '../model/setting-difference';
import { chooseDisplayUnit } from '../model/display-units';

type TypedAxis = Extract<Axis, { kind: 'typed' }>;
type Texts = readonly [string, string, string];

const letters = ['x', 'y', 'z'] as const;

const writeVector = (vector: Vector3, write: (element: number) => string): Texts => [write(vector[0]), write(vector[1]), write(vector[2])];

function readVector(texts: Texts): { vector: Vector3; error?: undefined } | { vector?: undefined; error: string } {
  const [x, y, z] = [readNumber(texts[0]), readNumber(texts[1]), readNumber(texts[2])];
  const wrong = [x, y, z].find((read) => read.error !== undefined);
  if (wrong?.error !== undefined || x.value === undefined || y.value === undefined || z.value === undefined) return { error: wrong?.error ?? '' };
  return { vector: [x.value, y.value, z.value] };
}

interface TypedAxisFieldsProps {
  axis: TypedAxis;
  onChange: (axis: TypedAxis) => void;
  /** What is typed is no axis; the one given in is then not what the fields say. */
  onUnreadable: () => void;
}

/** A point and a direction as numbers; they count as soon as all six are numbers and the direction is one. */
export function TypedAxisFields({ axis, onChange, onUnreadable }: TypedAxisFieldsProps) {
  const unit = chooseDisplayUnit('length', 0);
  const writePoint = (pointM: Vector3): Texts => writeVector(pointM, (element) => writeNumber(fromSi(element, unit)));
  const [shown, setShown] = useState(axis);
  const [point, setPoint] = useState(() => writePoint(axis.pointM));
  const [direction, setDirection] = useState(() => writeVector(axis.direction, writeNumber));
  if (!isSameAxis(axis, shown)) {
    // Changed from elsewhere: undone, or by another person.
    setShown(axis);
    setPoint(writePoint(axis.pointM));
    setDirection(writeVector(axis.direction, writeNumber));
  }
  const readPoint = readVector(point);
  const readDirection = readVector(direction);
  const isZero = readDirection.vector?.every((element) => element === 0) ?? false;
  const error = readPoint.error ?? readDirection.error ?? (isZero ? 'A direction needs at least one element other than 0.' : undefined);

  const commit = (points: Texts, directions: Texts): void => {
    setPoint(points);
    setDirection(directions);
    const { vector: pointRead } = readVector(points);
    const { vector: directionRead } = readVector(directions);
    if (!pointRead || !directionRead || directionRead.every((element) => element === 0)) {
      onUnreadable();
      return;
    }
    const next: TypedAxis = { kind: 'typed', pointM: [toSi(pointRead[0], unit), toSi(pointRead[1], unit), toSi(pointRead[2], unit)], direction: directionRead };
    setShown(next);
    onChange(next);
  };
  const replace = (texts: Texts, index: number, text: string): Texts => {
    const [x, y, z] = texts.map((other, position) => (position === index ? text : other));
    return [x ?? '', y ?? '', z ?? ''];
  };

  return (
    <div className="typed-axis">
      <div className="typed-axis-row">
        <span>
          Point <span className="unit">{unit.symbol}</span>
        </span>
        {letters.map((letter, index) => (
          <NumberInput
            key={letter}
            label={`Point ${letter} in ${unit.symbol}`}
            text={point[index] ?? ''}
            error={readNumber(point[index] ?? '').error}
            onChange={(text) => commit(replace(point, index, text), direction)}
          />
        ))}
      </div>
      <div className="typed-axis-row">
        <span>Direction</span>
        {letters.map((letter, index) => (
          <NumberInput
            key={letter}
            label={`Direction ${letter}`}
            text={direction[index] ?? ''}
            error={readNumber(direction[index] ?? '').error ?? (isZero ? 'zero' : undefined)}
            onChange={(text) => commit(point, replace(direction, index, text))}
          />
        ))}
      </div>
      <p role="status" className={error ? 'field-error' : 'soft'}>
        {error ?? 'In the mesh frame. A direction may have any length.'}
      </p>
    </div>
  );
}
