import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { Button } from '../../components/Button';
import { SectionHead } from '../../components/SectionHead';
import { FormProblem } from '../../lib/forms';
import { signOut } from '../session';
import { useLab } from './lab-context';

/** The way out of every device at once: a laptop left at a bench, a browser of somebody else. */
export function SessionsSection() {
  const { user } = useLab();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const leaving = useMutation({
    mutationFn: () => signOut(true),
    onSuccess: async () => {
      queryClient.clear();
      await navigate('/sign-in');
    },
  });
  return (
    <section aria-labelledby="sessions">
      <SectionHead id="sessions" className="mb-3">
        Your sign-ins
      </SectionHead>
      <p className="mb-3">
        You are signed in as {user.name} ({user.login}). Signing out everywhere ends it on every device, this
        one too.
      </p>
      <FormProblem error={leaving.error} />
      <Button onClick={() => leaving.mutate()} waitsFor={leaving.isPending ? 'the server' : undefined}>
        Sign out everywhere
      </Button>
    </section>
  );
}
