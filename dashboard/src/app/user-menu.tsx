import { Button, Field, Select } from '@fluentui/react-components';
import { roleNames, type Role } from '@hubtack/contracts/auth/role.js';
import { useMe, useSignOut } from '../lib/session';
import { setLook, useLook } from '../theme/use-look';
import { looks, type Look } from '../theme/themes';

const lookNames: Record<Look, string> = {
  light: 'Paper (light)',
  dark: 'Night (dark)',
  contrast: 'High contrast',
};

/** Who is signed in, how the page looks, and the way out. The browser's own popover: nothing to load for it. */
export function UserMenu() {
  const me = useMe();
  const look = useLook();
  const signOut = useSignOut();
  const role = me.role === 'display' ? 'Display' : roleNames[me.role satisfies Role];
  return (
    <div className="user-menu">
      <button type="button" className="user-menu-button" popoverTarget="user-menu">
        {role}
      </button>
      <div id="user-menu" popover="auto" className="user-menu-sheet">
        <p>
          <strong>{me.name}</strong>
          <br />
          {me.email}
          <br />
          {me.firmName}
        </p>
        <Field label="Look">
          <Select value={look} onChange={(_, { value }) => setLook(value as Look)}>
            {looks.map((name) => (
              <option key={name} value={name}>
                {lookNames[name]}
              </option>
            ))}
          </Select>
        </Field>
        <Button onClick={() => signOut.mutate()} disabled={signOut.isPending}>
          Sign out
        </Button>
      </div>
    </div>
  );
}
