import { useQueryClient } from '@tanstack/react-query';
import { Button } from '../../components/button.tsx';
import { useAction } from '../../lib/query.ts';

/** Ends the session here and forgets everything that this tab has read. */
export function SignOutButton() {
  const client = useQueryClient();
  const signOut = useAction('endSession', { onSuccess: () => leave(client) });
  return (
    <Button busy={signOut.isPending} onClick={() => signOut.mutate({})}>
      Sign out
    </Button>
  );
}

export function leave(client: ReturnType<typeof useQueryClient>): void {
  client.clear();
  location.assign('/sign-in');
}
