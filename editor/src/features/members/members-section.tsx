import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Confirm } from '../../components/confirm';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Section } from '../../components/page';
import { Select } from '../../components/select';
import { Problem, SkeletonRows } from '../../components/states';
import { Table } from '../../components/table';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { type Role, roleSchema, useAbilities, useMe } from '../../lib/me';
import { type Member, membersQuery, useChangeRole, useRemoveMember } from './api';
import styles from './members.module.css';
import { roleLabel, roleMeaning, roleOptions } from './roles';

export function MembersSection() {
  const members = useQuery(membersQuery);
  const { editMembers } = useAbilities();
  const me = useMe();
  const [leaving, setLeaving] = useState<Member | null>(null);
  return (
    <Section title="Members">
      {members.isPending && <SkeletonRows rows={3} label="Loading members" />}
      {members.isError && <Problem error={members.error} onRetry={() => members.refetch()} />}
      {members.data && (
        <Table label="Members">
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col">Role</th>
              <th scope="col" className={styles.wide}>
                Since
              </th>
              {editMembers && (
                <th scope="col">
                  <span className="visually-hidden">More</span>
                </th>
              )}
            </tr>
          </thead>
          <tbody>
            {members.data.map((member) => (
              <tr key={member.userId}>
                <td>
                  <strong className={styles.name}>{member.name}</strong>
                  {member.userId === me.user.id && <span className="quiet"> · you</span>}
                  <div className={styles.below}>{member.email}</div>
                </td>
                <td>
                  <RoleCell member={member} editable={editMembers} />
                </td>
                <td className={styles.wide}>{formatDay(member.since)}</td>
                {editMembers && (
                  <td data-align="end">
                    <MoreMenu label={`More for ${member.name}`}>
                      <MenuItem onSelect={() => setLeaving(member)}>Remove from the company…</MenuItem>
                    </MoreMenu>
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </Table>
      )}
      <RemoveMember member={leaving} onClose={() => setLeaving(null)} />
    </Section>
  );
}

function RoleCell({ member, editable }: { member: Member; editable: boolean }) {
  const change = useChangeRole();
  if (!editable)
    return (
      <>
        {roleLabel(member.role)}
        <div className={styles.below}>{roleMeaning(member.role)}</div>
      </>
    );
  const setRole = (role: Role) => {
    const { userId, name, role: before } = member;
    change.mutate(
      { userId, role },
      {
        onSuccess: () =>
          showToast({
            message: `${name} is ${roleLabel(role).toLowerCase()} now.`,
            undo: () => change.mutateAsync({ userId, role: before }),
          }),
        onError: (error) => void showProblem(sentenceOf(error)),
      },
    );
  };
  return (
    <Select
      aria-label={`Role of ${member.name}`}
      value={member.role}
      disabled={change.isPending}
      onChange={(event) => setRole(roleSchema.parse(event.target.value))}
    >
      {roleOptions.map(({ value, label }) => (
        <option key={value} value={value}>
          {label}
        </option>
      ))}
    </Select>
  );
}

/** To come back, a removed member has to be invited and accept: so this asks first. */
function RemoveMember({ member, onClose }: { member: Member | null; onClose: () => void }) {
  const remove = useRemoveMember();
  if (member === null) return null;
  return (
    <Confirm
      open
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      title={`Remove ${member.name}?`}
      doLabel="Remove"
      busy={remove.isPending}
      error={remove.error}
      onConfirm={() =>
        remove.mutate(member.userId, {
          onSuccess: () => {
            showToast({ message: `${member.name} is no longer in the company.` });
            onClose();
          },
        })
      }
    >
      They are signed out of this company at once. What they made stays. To come back they have to be invited
      again.
    </Confirm>
  );
}
