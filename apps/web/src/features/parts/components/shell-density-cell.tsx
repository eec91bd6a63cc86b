import { HTMLSelect } from '@blueprintjs/core';
import type { Setting, Shell } from '@masswright/contracts';
import { useState } from 'react';
import { TypedField, type ReadField } from '../../../components/typed-field';
import { describeDensity, readDensity, writeDensity } from '../../../lib/density';
import type { SettingEditor } from '../model/setting-editor';
import { changeShellDensity, findShellChoice, findShellDensity, type ShellChoice } from '../model/shell-densities';

const choiceWords: Record<ShellChoice, string> = { part: 'as the part', own: 'its own', out: 'left out' };

function readField(text: string): ReadField<number> {
  const { densityKgM3, error } = readDensity(text);
  return error === undefined ? { value: densityKgM3 ?? null } : { error };
}

interface ShellDensityCellProps {
  shell: number;
  kind: Shell['kind'];
  setting: Setting;
  editor: SettingEditor | undefined;
}

/** With which density a shell counts. */
export function ShellDensityCell({ shell, kind, setting: { shellDensities }, editor }: ShellDensityCellProps) {
  /** Its own was asked for, and is not typed yet. */
  const [isAsked, setIsAsked] = useState(false);
  const stated = findShellChoice(shellDensities, shell);
  const own = findShellDensity(shellDensities, shell)?.densityKgM3 ?? null;
  const choice: ShellChoice = stated === 'part' && isAsked ? 'own' : stated;
  const words: Record<ShellChoice, string> = kind === 'cavity' ? { ...choiceWords, part: 'as the shell around', out: 'filled' } : choiceWords;
  if (!editor) return stated === 'own' ? <span className="figure">{writeDensity(own)}</span> : <>{words[stated]}</>;
  const set = (densityKgM3: number | null | undefined): void => editor.change({ shellDensities: changeShellDensity(shellDensities, shell, densityKgM3) });
  const choose = (chosen: ShellChoice): void => {
    setIsAsked(chosen === 'own');
    if (chosen === 'part') set(undefined);
    if (chosen === 'out') set(null);
    if (chosen === 'own' && stated === 'out') set(undefined);
  };
  return (
    <span className="shell-density">
      <HTMLSelect
        aria-label={`Density of shell ${shell + 1}`}
        value={choice}
        // The hollow of a body has no density; one that another program gave it is shown all the same.
        options={(kind === 'cavity' && choice !== 'own' ? (['part', 'out'] as const) : (['part', 'own', 'out'] as const)).map((value) => ({ value, label: words[value] }))}
        onChange={(event) => choose(event.currentTarget.value as ShellChoice)}
      />
      {choice === 'own' && (
        <TypedField
          label={`Density of shell ${shell + 1}, typed`}
          value={own}
          write={writeDensity}
          read={readField}
          describe={describeDensity}
          emptyHint="With its unit; until then as the part."
          placeholder="7.85 g/cm3"
          onChange={(densityKgM3) => set(densityKgM3 ?? undefined)}
        />
      )}
    </span>
  );
}
