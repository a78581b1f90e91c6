import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { type Role, roles } from '../../../shared/permissions';
import { createInvitationSchema } from '../../../shared/schemas/labs';
import { Button } from '../../components/Button';
import { SectionHead } from '../../components/SectionHead';
import { SelectField } from '../../components/SelectField';
import { TextButton } from '../../components/TextLink';
import { TextField } from '../../components/TextField';
import { formatDate } from '../../lib/format';
import { FormProblem, schemaResolver, useIdempotencyKey } from '../../lib/forms';
import { QueryState } from '../../lib/QueryState';
import { InvitationLink } from './InvitationLink';
import { useLab } from './lab-context';
import { createInvitation, invitationsQuery, revokeInvitation } from './queries';
import { roleWithArticle } from './role-words';

interface InvitationValues {
  readonly role: string;
  readonly note: string;
}

interface InvitationBody {
  readonly role: Role;
  readonly note: string;
}

const roleOptions = roles.map((role) => ({ value: role, label: role }));

/** Invitations that wait to be accepted. Only for those who may let people in. */
export function InvitationsSection() {
  const { lab } = useLab();
  const queryClient = useQueryClient();
  const invitations = useQuery(invitationsQuery(lab.id));
  const [token, setToken] = useState<string | null>(null);
  const keyFor = useIdempotencyKey();
  const { register, formState, handleSubmit, reset } = useForm<InvitationValues, unknown, InvitationBody>({
    defaultValues: { role: 'operator', note: '' },
    resolver: schemaResolver(createInvitationSchema, (values) => values),
  });
  const renew = () => queryClient.invalidateQueries({ queryKey: ['labs', lab.id, 'invitations'] });
  const inviting = useMutation({
    mutationFn: (body: InvitationBody) => createInvitation(lab.id, body, keyFor(body)),
    onSuccess: async (created) => {
      setToken(created.token);
      reset();
      await renew();
    },
  });
  const revoking = useMutation({
    mutationFn: (id: string) => revokeInvitation(lab.id, id),
    onSuccess: renew,
  });
  const items = invitations.data?.items;
  return (
    <section aria-labelledby="invitations">
      <SectionHead id="invitations" className="mb-3">
        Invitations
      </SectionHead>
      {items === undefined ? (
        <QueryState query={invitations} what="the invitations" />
      ) : items.length === 0 ? (
        <p className="text-ink-2">No invitation waits.</p>
      ) : (
        <ul>
          {items.map((invitation) => (
            <li
              key={invitation.id}
              className="border-hair flex items-baseline justify-between gap-4 border-b py-2"
            >
              <span>
                <span className="font-strong">{invitation.note}</span>, as {roleWithArticle(invitation.role)}
                <span className="text-s text-ink-2 block">
                  holds until {formatDate(new Date(invitation.expiresAt))}
                </span>
              </span>
              <TextButton onClick={() => revoking.mutate(invitation.id)}>
                Withdraw<span className="sr-only"> the invitation of {invitation.note}</span>
              </TextButton>
            </li>
          ))}
        </ul>
      )}
      <FormProblem error={revoking.error} />
      {token !== null && <InvitationLink token={token} onDone={() => setToken(null)} />}
      <form
        noValidate
        onSubmit={(event) => void handleSubmit((body) => inviting.mutate(body))(event)}
        className="mt-4 grid gap-4 sm:grid-cols-[1fr_10rem]"
      >
        <TextField
          label="for whom: a name or an address"
          help="A note for the lab; nothing is sent."
          fault={formState.errors.note?.message}
          {...register('note')}
          required
        />
        <SelectField
          label="as"
          options={roleOptions}
          fault={formState.errors.role?.message}
          {...register('role')}
        />
        <div className="space-y-2 sm:col-span-2">
          <FormProblem error={inviting.error} />
          <Button type="submit" waitsFor={inviting.isPending ? 'the server' : undefined}>
            Make an invitation
          </Button>
        </div>
      </form>
    </section>
  );
}
