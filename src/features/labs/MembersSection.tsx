import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { type Role, roles } from '../../../shared/permissions';
import type { LabMember } from '../../../shared/schemas/labs';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';
import { sayDone } from '../../components/live-region-store';
import { SectionHead } from '../../components/SectionHead';
import { TextButton } from '../../components/TextLink';
import { formatDate } from '../../lib/format';
import { FormProblem } from '../../lib/forms';
import { QueryState } from '../../lib/QueryState';
import { useLab } from './lab-context';
import { changeRole, membersQuery, removeMember } from './queries';
import { roleWords } from './role-words';

/** The only lead can't stop being one: nobody could then let a new one in. */
function isLastLead(member: LabMember, members: readonly LabMember[]): boolean {
  return member.role === 'lead' && members.filter(({ role }) => role === 'lead').length === 1;
}

function RoleCell(props: {
  readonly member: LabMember;
  readonly lastLead: boolean;
  readonly onChange: (role: Role) => void;
}) {
  const { member, lastLead, onChange } = props;
  if (lastLead) {
    return (
      <>
        lead
        <span className="text-s text-ink-2 block">The only one: make another lead before this changes.</span>
      </>
    );
  }
  return (
    <select
      aria-label={`Role of ${member.name}`}
      className="border-rule bg-glass h-9 border px-2 max-sm:h-11"
      value={member.role}
      onChange={(event) => {
        const chosen = roles.find((role) => role === event.target.value);
        if (chosen !== undefined) onChange(chosen);
      }}
    >
      {roles.map((role) => (
        <option key={role}>{role}</option>
      ))}
    </select>
  );
}

/** Who belongs to the lab, and as what. Only a lead changes it. */
export function MembersSection() {
  const { lab, may, user } = useLab();
  const queryClient = useQueryClient();
  const members = useQuery(membersQuery(lab.id));
  const [leaving, setLeaving] = useState<LabMember | null>(null);
  const renew = async (sentence: string) => {
    setLeaving(null);
    sayDone(sentence);
    await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
    await queryClient.invalidateQueries({ queryKey: ['session'] });
  };
  const changing = useMutation({
    mutationFn: ({ member, role }: { member: LabMember; role: Role }) =>
      changeRole(lab.id, member.userId, role),
    onSuccess: (_, { member, role }) => renew(`${member.name} is ${role} now.`),
  });
  const removing = useMutation({
    mutationFn: ({ userId }: LabMember) => removeMember(lab.id, userId),
    onSuccess: (_, { name }) => renew(`${name} is out of ${lab.name}.`),
  });
  const items = members.data?.items;
  const manages = may('members.manage');
  return (
    <section aria-labelledby="members">
      <SectionHead id="members" className="mb-3">
        Members
      </SectionHead>
      {items === undefined ? (
        <QueryState query={members} what="the members" />
      ) : (
        <table className="w-full text-left">
          <thead className="text-s text-ink-2">
            <tr className="border-hair border-b">
              <th scope="col" className="py-2 pr-4 font-words">
                name
              </th>
              <th scope="col" className="py-2 pr-4 font-words">
                role
              </th>
              <th scope="col" className="py-2 pr-4 font-words max-sm:hidden">
                since
              </th>
              {manages && (
                <th scope="col">
                  <span className="sr-only">take out</span>
                </th>
              )}
            </tr>
          </thead>
          <tbody>
            {items.map((member) => (
              <tr key={member.userId} className="border-hair border-b align-top">
                <th scope="row" className="py-2 pr-4 font-words">
                  <span className="font-strong">{member.name}</span>
                  {member.userId === user.id && ' (you)'}
                  <span className="text-s text-ink-2 block">{member.login}</span>
                </th>
                <td className="py-2 pr-4">
                  {manages ? (
                    <RoleCell
                      member={member}
                      lastLead={isLastLead(member, items)}
                      onChange={(role) => changing.mutate({ member, role })}
                    />
                  ) : (
                    member.role
                  )}
                </td>
                <td className="py-2 pr-4 whitespace-nowrap max-sm:hidden">
                  {formatDate(new Date(member.joinedAt))}
                </td>
                {manages && (
                  <td className="py-2 text-right">
                    {!isLastLead(member, items) && (
                      <TextButton className="whitespace-nowrap" onClick={() => setLeaving(member)}>
                        Take out<span className="sr-only"> {member.name}</span>
                      </TextButton>
                    )}
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <FormProblem error={changing.error ?? removing.error} />
      <dl className="text-s text-ink-2 mt-4 space-y-1">
        {roles.map((role) => (
          <div key={role}>
            <dt className="font-strong inline">{role}</dt> <dd className="inline">{roleWords[role]}</dd>
          </div>
        ))}
      </dl>
      <Dialog
        open={leaving !== null}
        onClose={() => setLeaving(null)}
        question={`Take ${leaving?.name ?? ''} out of ${lab.name}?`}
        actions={
          <>
            <Button
              kind="danger"
              onClick={() => {
                if (leaving !== null) removing.mutate(leaving);
              }}
            >
              Take out {leaving?.name}
            </Button>
            <Button onClick={() => setLeaving(null)}>Leave it as it was</Button>
          </>
        }
      >
        <p>
          From then on no page of this lab opens to {leaving?.name}. What they made and recorded stays, with
          their name. Another invitation brings them back.
        </p>
      </Dialog>
    </section>
  );
}
