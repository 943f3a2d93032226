import { Button } from '@radix-ui/themes';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { FormError, TextInput } from '@/components/forms/field';
import { FailedState, LoadingState } from '@/components/states/states';
import { api, unwrap } from '@/lib/api-client';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { accountQueries } from '../api/account-queries';

/** Makes tokens, shows each once, and withdraws them. */
export function TokensSection() {
  const queryClient = useQueryClient();
  const tokens = useQuery(accountQueries.tokens());
  const [name, setName] = useState('');
  const refresh = () => queryClient.invalidateQueries({ queryKey: accountQueries.tokens().queryKey });
  const make = useMutation({
    mutationFn: () => unwrap(api.POST('/api/me/tokens', { body: { name: name.trim() } })),
    onSuccess: () => {
      setName('');
      return refresh();
    },
  });
  if (tokens.isPending) return <LoadingState what="Fetching your tokens" />;
  if (tokens.isError) {
    return (
      <FailedState
        what="Your tokens could not be fetched."
        why={errorWords(tokens.error)}
        onRetry={() => void tokens.refetch()}
      />
    );
  }
  return (
    <>
      {tokens.data.length > 0 && <TokenTable tokens={tokens.data} onWithdrawn={refresh} />}
      <form
        className="bl-account-token"
        onSubmit={(event) => {
          event.preventDefault();
          if (name.trim() !== '') make.mutate();
        }}
      >
        <TextInput
          label="What the token is for"
          help="The machine or the task, so that you know later which one to withdraw."
          maxLength={80}
          value={name}
          onChange={({ target }) => setName(target.value)}
        />
        <p className="bl-account-act">
          <Button
            type="submit"
            variant="surface"
            color="gray"
            highContrast
            disabled={make.isPending || name.trim() === ''}
          >
            Make a token
          </Button>
        </p>
        {make.error && <FormError>{errorWords(make.error)}</FormError>}
      </form>
      <div role="status">{make.data && <NewToken token={make.data.token} />}</div>
    </>
  );
}

/** Shown once: the server keeps only its hash. */
function NewToken({ token }: { token: string }) {
  const [isCopied, setIsCopied] = useState(false);
  const command = `npm run --silent benchlark -- upload FILE.wav --to ${location.origin} --token ${token}`;
  return (
    <div className="bl-account-new">
      <p>
        <strong>Copy it now: it is shown this once.</strong>
      </p>
      <p>
        <code>{token}</code>
      </p>
      <p>This uploads a recording from the project&rsquo;s folder:</p>
      <pre tabIndex={0}>{command}</pre>
      <button
        type="button"
        className="bl-word"
        onClick={() => void navigator.clipboard.writeText(command).then(() => setIsCopied(true))}
      >
        {isCopied ? 'Copied' : 'Copy the command'}
      </button>
    </div>
  );
}

interface TokenRow {
  id: string;
  name: string;
  createdAt: string;
  lastUsedAt: string | null;
}

function TokenTable({
  tokens,
  onWithdrawn,
}: {
  tokens: readonly TokenRow[];
  onWithdrawn: () => Promise<void>;
}) {
  const [asked, setAsked] = useState<TokenRow | null>(null);
  const withdraw = useMutation({
    mutationFn: (id: string) => unwrap(api.DELETE('/api/me/tokens/{id}', { params: { path: { id } } })),
    onSuccess: () => {
      setAsked(null);
      return onWithdrawn();
    },
  });
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of tokens">
      <table className="bl-table">
        <thead>
          <tr>
            <th scope="col">for</th>
            <th scope="col">made</th>
            <th scope="col">last used</th>
            <th scope="col">
              <span className="bl-hidden">withdraw</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {tokens.map((token) => (
            <tr key={token.id}>
              <th scope="row">{token.name}</th>
              <td>{formatDate(token.createdAt)}</td>
              <td>{token.lastUsedAt ? formatDate(token.lastUsedAt) : 'never'}</td>
              <td>
                <button
                  type="button"
                  className="bl-word"
                  aria-label={`Withdraw ${token.name}`}
                  onClick={() => setAsked(token)}
                >
                  Withdraw
                </button>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <ConfirmDialog
        isOpen={asked !== null}
        onOpenChange={(isOpen) => {
          if (!isOpen) setAsked(null);
        }}
        title={`Withdraw the token for ${asked?.name ?? ''}`}
        confirmLabel="Withdraw it"
        isDestructive
        isBusy={withdraw.isPending}
        error={withdraw.error ? errorWords(withdraw.error) : null}
        onConfirm={() => asked && withdraw.mutate(asked.id)}
      >
        Whatever uses it is refused from now on. This cannot be taken back.
      </ConfirmDialog>
    </div>
  );
}
