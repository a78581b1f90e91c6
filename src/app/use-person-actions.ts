import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import type { Session } from '../../shared/schemas/labs';
import type { PersonActions } from '../components/PersonPanel';
import { signOut } from '../features/session';

/** What a person can do at the end of the beam. Signing out forgets all that this page knew. */
export function usePersonActions(session: Session, currentLabId?: string): PersonActions {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const leave = async (everywhere: boolean) => {
    await signOut(everywhere);
    queryClient.clear();
    await navigate('/sign-in');
  };
  return {
    onSignOut: () => void leave(false),
    onSignOutEverywhere: () => void leave(true),
    labs: session.labs,
    currentLabId,
    onSwitchLab: (labId) => void navigate(`/labs/${labId}`),
  };
}

/** Two letters for the stop of the beam: of the first and the last name. */
export function initialsOf(name: string): string {
  const words = name.split(/\s+/u).filter((word) => word !== '');
  const ends = words.length > 1 ? [words[0], words.at(-1)] : words;
  return ends.map((word) => Array.from(word ?? '')[0]?.toUpperCase() ?? '').join('');
}
