import { Button, PopoverNext } from '@blueprintjs/core';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { ChoiceBar, type Choice } from '../components/choice-bar';
import { ConfirmDialog } from '../components/confirm-dialog';
import { countOf } from '../lib/plural';
import { useSignedIn, useSignOut, useSwitchOrganisation } from '../features/session/api/session';
import { computeInitials } from '../features/session/model/initials';
import { useUnfinishedUploads, stopUploads } from '../features/uploads/model/upload-queue';
import { openKeysDialog } from './keys-dialog-state';
import { noteSignOut } from './sign-out';
import { chooseTheme, useThemeChoice, type ThemeChoice } from './theme';

const themeChoices: readonly Choice<ThemeChoice>[] = [
  { value: 'day', label: 'Day' },
  { value: 'night', label: 'Night' },
  { value: 'system', label: 'System' },
];

/** A leave-taking that would cut off files that are still being sent: it is asked about first. */
type Leaving = { kind: 'sign-out' } | { kind: 'switch'; organisationId: string };

export function AccountMenu() {
  const session = useSignedIn();
  const theme = useThemeChoice();
  const navigate = useNavigate();
  const signOut = useSignOut();
  const switchOrganisation = useSwitchOrganisation();
  const unfinished = useUnfinishedUploads();
  const [asked, setAsked] = useState<Leaving>();

  const leave = (leaving: Leaving): void => {
    stopUploads();
    if (leaving.kind === 'sign-out') {
      noteSignOut();
      signOut.mutate(undefined, { onSettled: () => setAsked(undefined) });
    } else {
      void navigate('/');
      switchOrganisation.mutate(leaving.organisationId, { onSettled: () => setAsked(undefined) });
    }
  };
  const ask = (leaving: Leaving): void => (unfinished > 0 ? setAsked(leaving) : leave(leaving));
  const error = signOut.error ?? switchOrganisation.error;

  const panel = (
    <div className="account" aria-label="Account" role="group">
      <p className="account-who">
        <b>{session.user.name}</b>
        <span className="soft">{session.user.email}</span>
        <span className="soft">
          {session.role} at {session.organisation.name}
        </span>
      </p>
      {session.organisations.length > 1 && (
        <section aria-labelledby="account-organisations">
          <p className="caption" id="account-organisations">
            Organisation
          </p>
          <ul>
            {session.organisations.map(({ id, name, role }) => (
              <li key={id}>
                {id === session.organisation.id ? (
                  <span className="account-organisation" aria-current="true">
                    <span>{name}</span> <span className="soft">here</span>
                  </span>
                ) : (
                  <button type="button" className="account-organisation" onClick={() => ask({ kind: 'switch', organisationId: id })}>
                    <span>{name}</span> <span className="soft">{role}</span>
                  </button>
                )}
              </li>
            ))}
          </ul>
        </section>
      )}
      <section aria-labelledby="account-theme">
        <p className="caption" id="account-theme">
          Theme
        </p>
        <ChoiceBar label="Theme" choices={themeChoices} value={theme} onChange={chooseTheme} />
      </section>
      <Button variant="minimal" className="account-keys" onClick={openKeysDialog}>
        Keys <kbd>?</kbd>
      </Button>
      <Button onClick={() => ask({ kind: 'sign-out' })}>Sign out</Button>
    </div>
  );
  const initials = computeInitials(session.user.name);

  return (
    <>
      <PopoverNext content={panel} placement="bottom-end" animation="minimal" arrow={false} popoverClassName="account-popover">
        <Button variant="minimal" className="band-who" aria-label={`${initials}: account of ${session.user.name}`}>
          {initials}
        </Button>
      </PopoverNext>
      {error && !asked && (
        <span role="alert" className="band-problem">
          {error.message}
        </span>
      )}
      <ConfirmDialog
        title={`${countOf(unfinished, 'file is', 'files are')} still being sent`}
        isOpen={asked !== undefined}
        isBusy={signOut.isPending || switchOrganisation.isPending}
        error={error}
        confirmLabel={asked?.kind === 'switch' ? 'Stop and switch' : 'Stop and sign out'}
        cancelLabel="Let them finish"
        onCancel={() => setAsked(undefined)}
        onConfirm={() => asked && leave(asked)}
      >
        <p>If you go now they are stopped, and nothing of them is kept. What was stored already stays.</p>
      </ConfirmDialog>
    </>
  );
}
