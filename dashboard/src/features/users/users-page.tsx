import { Button } from '@fluentui/react-components';
import { roleNames, roles } from '@hubtack/contracts/auth/role.js';
import {
  changeUserBody,
  inviteUserBody,
  type InvitedUser,
  type User,
} from '@hubtack/contracts/users/user.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useFormContext } from 'react-hook-form';
import { CopyText } from '../../components/copy-text';
import { DataTable } from '../../components/data-table';
import { Form } from '../../components/form';
import { ChoiceField, InUseField, TextField } from '../../components/form-fields';
import { ListPage } from '../../components/list-page';
import { Sheet } from '../../components/sheet';
import { crewsQuery } from '../../lib/crews';
import { dayAndTime } from '../../lib/format';
import { useMe } from '../../lib/session';
import { useChangeUser, useInviteAgain, useInviteUser, usersQuery } from '../../lib/users';
import { AuditTrail } from './audit-trail';
import { Displays } from './displays';

const roleOptions = roles.map((role) => ({ value: role, label: roleNames[role] }));
const statusWords = { invited: 'invited', active: 'active', off: 'switched off' } as const;

function RoleFields() {
  const { data: crews = [] } = useQuery(crewsQuery);
  const { watch } = useFormContext();
  const options = crews.filter(({ active }) => active).map(({ id, name }) => ({ value: id, label: name }));
  return (
    <>
      <ChoiceField name="role" label="Role" options={roleOptions} required />
      {watch('role') === 'crewChief' && (
        <ChoiceField
          key={options.length}
          name="crewId"
          label="Crew"
          options={options}
          none="Choose a crew"
          as="number"
          required
        />
      )}
    </>
  );
}

function Invitation({ invited }: { invited: InvitedUser }) {
  if (invited.link === null) return <p role="status">An invitation is on its way to {invited.user.email}.</p>;
  return (
    <div role="status">
      <p>No mail could be sent. Hand this link over yourself; it works once, for seven days.</p>
      <CopyText text={invited.link} label="the invitation link" />
    </div>
  );
}

function InviteUser({ onDone }: { onDone: () => void }) {
  const invite = useInviteUser();
  if (invite.data)
    return (
      <Sheet title="Invited" onClose={onDone}>
        <Invitation invited={invite.data} />
      </Sheet>
    );
  return (
    <Sheet title="Invite somebody" onClose={onDone}>
      <Form
        schema={inviteUserBody}
        defaults={{ name: '', email: '', role: 'dispatcher', crewId: null }}
        button="Send the invitation"
        onCancel={onDone}
        submit={(body) => invite.mutateAsync(body)}
      >
        <TextField name="name" label="Name" required />
        <TextField name="email" label="E-mail address" type="email" autoComplete="off" required />
        <RoleFields />
      </Form>
    </Sheet>
  );
}

function ChangeUser({ user, onDone }: { user: User; onDone: () => void }) {
  const change = useChangeUser(user.id);
  const again = useInviteAgain();
  const { name, role, crewId } = user;
  return (
    <Sheet title={`Change ${name}`} onClose={onDone}>
      {again.data && <Invitation invited={again.data} />}
      {again.error && <p role="alert">{again.error.message}</p>}
      <Form
        schema={changeUserBody}
        defaults={{ name, role, crewId, active: user.status !== 'off' }}
        button="Save"
        onCancel={onDone}
        submit={async (body) => {
          await change.mutateAsync(body);
          onDone();
        }}
      >
        <TextField name="name" label="Name" required />
        <RoleFields />
        <InUseField name="active" inUse />
      </Form>
      {user.status === 'invited' && (
        <Button disabled={again.isPending} onClick={() => again.mutate(user.id)}>
          Send the invitation again
        </Button>
      )}
    </Sheet>
  );
}

export default function UsersPage() {
  const query = useQuery(usersQuery);
  const { data: crews = [] } = useQuery(crewsQuery);
  const { timeZone } = useMe();
  const [open, setOpen] = useState<User | 'new' | null>(null);
  const close = () => setOpen(null);
  const crewName = (id: number | null) => crews.find((crew) => crew.id === id)?.name ?? '–';
  return (
    <>
      <ListPage
        title="Users"
        what="the users"
        query={query}
        action={
          <Button appearance="primary" onClick={() => setOpen('new')}>
            Invite somebody
          </Button>
        }
      >
        {(users) => (
          <DataTable
            label="Users"
            rows={users}
            rowKey={({ id }) => id}
            isFaded={({ status }) => status === 'off'}
            columns={[
              { name: 'Name', cell: (user) => <strong>{user.name}</strong> },
              { name: 'E-mail address', cell: (user) => user.email },
              { name: 'Role', cell: (user) => roleNames[user.role] },
              { name: 'Crew', cell: (user) => crewName(user.crewId) },
              { name: 'Standing', cell: (user) => statusWords[user.status] },
              {
                name: 'Last sign-in',
                cell: (user) =>
                  user.lastSignInAt === null ? 'never' : dayAndTime(Date.parse(user.lastSignInAt), timeZone),
              },
              {
                name: 'Change',
                cell: (user) => (
                  <Button size="small" onClick={() => setOpen(user)} aria-label={`Change ${user.name}`}>
                    Change
                  </Button>
                ),
              },
            ]}
          />
        )}
      </ListPage>
      {open === 'new' && <InviteUser onDone={close} />}
      {open !== null && open !== 'new' && <ChangeUser user={open} onDone={close} />}
      <Displays />
      <AuditTrail />
    </>
  );
}
