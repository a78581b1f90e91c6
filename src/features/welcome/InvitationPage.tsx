import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { Button } from '../../components/Button';
import { TextLink } from '../../components/TextLink';
import { ApiError } from '../../lib/api';
import { formatDate } from '../../lib/format';
import { FormProblem } from '../../lib/forms';
import { QueryState } from '../../lib/QueryState';
import { roleWithArticle } from '../labs';
import { acceptInvitation, invitationQuery } from './queries';

/** An invitation, opened by who was sent it. Nothing happens until it is accepted. */
export function Component() {
  const { token = '' } = useParams();
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const invitation = useQuery(invitationQuery(token));
  const accepting = useMutation({
    mutationFn: () => acceptInvitation(token),
    onSuccess: async ({ labId }) => {
      await queryClient.invalidateQueries({ queryKey: ['session'] });
      await navigate(`/labs/${labId}`);
    },
  });
  const gone = invitation.error instanceof ApiError && [404, 410].includes(invitation.error.status);
  const preview = invitation.data;
  return (
    <div className="max-w-[44rem] pt-6">
      <title>Invitation · Quarterturn</title>
      {gone ? (
        <>
          <h1 className="text-title mb-4">This invitation does not hold</h1>
          <p>
            It was used, withdrawn, or has run out. Ask the lead who sent it for another.{' '}
            <TextLink to="/welcome">Other ways in</TextLink>
          </p>
        </>
      ) : preview === undefined ? (
        <>
          <h1 className="text-title mb-4">An invitation</h1>
          <QueryState query={invitation} what="the invitation" />
        </>
      ) : (
        <>
          <h1 className="text-title mb-4">
            Join {preview.labName} as {roleWithArticle(preview.role)}?
          </h1>
          <p className="mb-6">
            Its members will see your name and login name, and what you make there carries your name. The
            invitation holds until {formatDate(new Date(preview.expiresAt))}.
          </p>
          <FormProblem error={accepting.error} />
          <div className="flex flex-wrap items-center gap-4">
            <Button
              kind="filled"
              onClick={() => accepting.mutate()}
              waitsFor={accepting.isPending ? 'the server' : undefined}
            >
              Join {preview.labName}
            </Button>
            <TextLink to="/">Not now</TextLink>
          </div>
        </>
      )}
    </div>
  );
}
