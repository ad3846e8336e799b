import { useNavigate } from 'react-router-dom';

import { buttonClasses } from '@/components/ui/button';
import { api } from '@/lib/api-client';
import { useRefreshSession, useSession } from '@/lib/session';
import { useTheme, type ThemeChoice } from '@/lib/theme';
import { Link } from 'react-router-dom';

import { Menu, MenuChoice, MenuItem, MenuLabel, MenuSeparator } from './menu';

const THEMES: readonly { readonly value: ThemeChoice; readonly label: string }[] = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
];

function initials(name: string): string {
  const words = name.split(/\s+/).filter(Boolean);
  return [words[0], words.length > 1 ? words.at(-1) : undefined]
    .map((word) => word?.[0]?.toUpperCase() ?? '')
    .join('');
}

function ThemeChoices() {
  const { choice, choose } = useTheme();
  return (
    <>
      <MenuLabel>Page colours</MenuLabel>
      <MenuChoice value={choice} choices={THEMES} onChoose={choose} />
    </>
  );
}

export function AccountMenu() {
  const session = useSession();
  const refresh = useRefreshSession();
  const navigate = useNavigate();
  const user = session.data?.user ?? null;

  const handleSignOut = async () => {
    await api.delete('/session');
    await refresh();
    await navigate('/sign-in');
  };

  if (!user) {
    return (
      <div className="flex items-center gap-2">
        <Menu
          trigger={
            <button type="button" className={buttonClasses('quiet', 'small', 'max-sm:hidden')}>
              Colours
            </button>
          }
        >
          <ThemeChoices />
        </Menu>
        <Link to="/sign-in" className={buttonClasses('plain')}>
          Sign in
        </Link>
      </div>
    );
  }
  return (
    <Menu
      trigger={
        <button
          type="button"
          aria-label={`Account of ${user.name}`}
          className="grid size-8 place-items-center rounded-full bg-[#1d4f8c] text-xs font-semibold text-white"
        >
          {initials(user.name)}
        </button>
      }
    >
      <MenuLabel>
        {user.name}
        <br />
        {user.email}
      </MenuLabel>
      <MenuSeparator />
      <MenuItem onSelect={() => void navigate('/account')}>Account and sessions</MenuItem>
      {session.data?.demo ? (
        <MenuItem onSelect={() => void navigate('/mail')}>Mail of the demo</MenuItem>
      ) : null}
      <MenuSeparator />
      <ThemeChoices />
      <MenuSeparator />
      <MenuItem onSelect={() => void handleSignOut()}>Sign out</MenuItem>
    </Menu>
  );
}
