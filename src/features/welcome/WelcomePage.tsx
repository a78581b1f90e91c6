import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useForm } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import { createLabSchema } from '../../../shared/schemas/labs';
import { Button } from '../../components/Button';
import { SectionHead } from '../../components/SectionHead';
import { TextField } from '../../components/TextField';
import { TextLink } from '../../components/TextLink';
import { FormProblem, schemaResolver, useIdempotencyKey } from '../../lib/forms';
import { sessionQuery } from '../session';
import { invitationToken } from './invitation-token';
import { createLab } from './queries';

function MakeLab() {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const keyFor = useIdempotencyKey();
  const { register, formState, handleSubmit } = useForm<{ name: string }, unknown, { name: string }>({
    defaultValues: { name: '' },
    resolver: schemaResolver(createLabSchema, (values) => values),
  });
  const making = useMutation({
    mutationFn: (body: { name: string }) => createLab(body.name, keyFor(body)),
    onSuccess: async (lab) => {
      await queryClient.invalidateQueries({ queryKey: ['session'] });
      await navigate(`/labs/${lab.id}`);
    },
  });
  return (
    <form
      noValidate
      onSubmit={(event) => void handleSubmit((body) => making.mutate(body))(event)}
      className="space-y-4"
    >
      <TextField
        label="lab’s name"
        help="As your group calls itself. It can be changed later."
        fault={formState.errors.name?.message}
        {...register('name')}
        required
      />
      <FormProblem error={making.error} />
      <Button kind="filled" type="submit" waitsFor={making.isPending ? 'the server' : undefined}>
        Make the lab
      </Button>
    </form>
  );
}

function OpenInvitation() {
  const navigate = useNavigate();
  const { register, formState, handleSubmit, setError } = useForm({ defaultValues: { link: '' } });
  const open = ({ link }: { link: string }) => {
    const token = invitationToken(link);
    if (token === null) {
      setError('link', {
        message:
          'This holds no invitation. Paste the whole link that you were sent; it has /invitations/ in it.',
      });
    } else void navigate(`/invitations/${token}`);
  };
  return (
    <form noValidate onSubmit={(event) => void handleSubmit(open)(event)} className="space-y-4">
      <TextField
        label="link of the invitation"
        mono
        fault={formState.errors.link?.message}
        {...register('link')}
        required
      />
      <Button type="submit">Open the invitation</Button>
    </form>
  );
}

/** Signed in, and in no lab yet: make one, or join one. */
export function Component() {
  const { data: session } = useQuery(sessionQuery);
  const labs = session?.labs ?? [];
  return (
    <div className="max-w-[64rem] pt-6">
      <title>Welcome · Quarterturn</title>
      <h1 className="text-title">{labs.length === 0 ? 'You are in no lab yet' : 'Another lab'}</h1>
      <p className="text-ink-2 mt-1 mb-8">
        {session?.user === null || session === undefined ? '' : `Signed in as ${session.user.name}. `}A lab’s
        plates, protocols and runs are seen by its members only.
      </p>
      <div className="grid grid-cols-1 gap-x-14 gap-y-10 md:grid-cols-2">
        <section aria-labelledby="join">
          <SectionHead id="join" className="mb-3">
            Join one that has invited you
          </SectionHead>
          <OpenInvitation />
        </section>
        <section aria-labelledby="make">
          <SectionHead id="make" className="mb-3">
            Make one and lead it
          </SectionHead>
          <MakeLab />
        </section>
      </div>
      {labs.length > 0 && (
        <section aria-labelledby="yours" className="mt-10">
          <SectionHead id="yours" className="mb-3">
            Your labs
          </SectionHead>
          <ul>
            {labs.map(({ id, name, role }) => (
              <li key={id} className="border-hair border-b py-2">
                <TextLink to={`/labs/${id}`}>{name}</TextLink> <span className="text-ink-2">as {role}</span>
              </li>
            ))}
          </ul>
        </section>
      )}
    </div>
  );
}
