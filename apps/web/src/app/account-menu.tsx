import { Button, Menu, MenuDivider, MenuItem, PopoverNext } from '@blueprintjs/core';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { ConfirmDialog } from '../components/confirm-dialog';
import { countOf } from '../lib/plural';
import { useSignedIn, useSignOut, useSwitchOrganisation } from '../features/session/api/session';
import { computeInitials } from '../features/session/model/initials';
import { useUnfinishedUploads, stopUploads } from '../features/uploads/model/upload-queue';
import { noteSignOut } from './sign-out';
import { chooseTheme, themeChoices, useThemeChoice, type ThemeChoice } from './theme';

const themeNames: Record<ThemeChoice, string> = { day: 'Day', night: 'Night', system: 'As the system' };
const roleNames = { administrator: 'administrator', engineer: 'engineer', reviewer: 'reviewer', reader: 'reader' } as const;

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

  const menu = (
    <Menu className="account-menu">
      <li className="account-menu-who" role="none">
        <b>{session.user.name}</b>
        <span className="soft">{session.user.email}</span>
        <span className="soft">
          {roleNames[session.role]} at {session.organisation.name}
        </span>
      </li>
      {session.organisations.length > 1 && (
        <>
          <MenuDivider title="Organisation" />
          {session.organisations.map((organisation) => (
            <MenuItem
              key={organisation.id}
              text={organisation.name}
              label={organisation.role}
              roleStructure="listoption"
              selected={organisation.id === session.organisation.id}
              onClick={() => organisation.id !== session.organisation.id && ask({ kind: 'switch', organisationId: organisation.id })}
            />
          ))}
        </>
      )}
      <MenuDivider title="Theme" />
      {themeChoices.map((choice) => (
        <MenuItem key={choice} text={themeNames[choice]} roleStructure="listoption" selected={theme === choice} shouldDismissPopover={false} onClick={() => chooseTheme(choice)} />
      ))}
      <MenuDivider />
      <MenuItem text="Sign out" onClick={() => ask({ kind: 'sign-out' })} />
    </Menu>
  );

  return (
    <>
      <PopoverNext content={menu} placement="bottom-end" animation="minimal" arrow={false}>
        <Button variant="minimal" className="band-who" aria-label={`Account of ${session.user.name}`}>
          {computeInitials(session.user.name)}
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
