import { useState, type KeyboardEvent } from 'react';
import { DensityField } from '../../../components/density-field';
import { readDensity, writeDensity } from '../../../lib/density';

interface DensitySettingProps {
  densityKgM3: number | null;
  onChange: (densityKgM3: number | null) => void;
}

/**
 * The density of a part. What is typed counts as soon as it is a density; half a word is not yet an error while the person is typing,
 * and an emptied field takes the density away only when they leave it.
 */
export function DensitySetting({ densityKgM3, onChange }: DensitySettingProps) {
  const [text, setText] = useState(() => writeDensity(densityKgM3));
  const [shown, setShown] = useState(densityKgM3);
  const [typing, setTyping] = useState(false);
  if (densityKgM3 !== shown) {
    // Changed from elsewhere: undone, or by another person.
    setShown(densityKgM3);
    setText(writeDensity(densityKgM3));
  }
  const commit = (typed: string, finished: boolean): void => {
    // Fewer digits are shown than are stored: what nobody has changed is not to be stored with fewer.
    if (typed === writeDensity(densityKgM3)) return;
    const { densityKgM3: read } = readDensity(typed);
    if (read === undefined || (read === null && !finished)) return;
    setShown(read);
    onChange(read);
  };
  const finish = (): void => {
    setTyping(false);
    commit(text, true);
  };
  return (
    <DensityField
      text={text}
      label=""
      ariaLabel="Density"
      showError={!typing}
      emptyHint="Type it with its unit, such as 2.7 g/cm3: then there is a mass."
      onChange={(typed) => {
        setTyping(true);
        setText(typed);
        commit(typed, false);
      }}
      onBlur={finish}
      onKeyDown={(event: KeyboardEvent) => {
        if (event.key === 'Enter') finish();
      }}
    />
  );
}
