import { useState } from 'react';
import { Button, ConfirmDialog, EmptyState, toast } from '@/components/ui';
import { sendJson } from '@/lib/api';
import { formatAgo, formatDate } from '@/lib/format';
import type { TokenView } from '../workspaces';
import { NewToken } from './NewToken';

/** API tokens that work: made here, shown once, revoked here. */
export function TokensPlace({ workspaceId, initial }: { workspaceId: string; initial: TokenView[] }) {
  const url = `/api/v1/workspaces/${workspaceId}/tokens`;
  const [tokens, setTokens] = useState(initial);
  const [asking, setAsking] = useState<TokenView | null>(null);
  return (
    <div className="col" style={{ gap: 16 }}>
      {tokens.length === 0 ? (
        <EmptyState title="No token works at present" level={2}>
          A token lets a script do in this workspace what you may do, or only read.
        </EmptyState>
      ) : (
        <section className="card">
          <div className="tw" tabIndex={0} role="region" aria-label="API tokens">
            <table className="tbl">
              <thead>
                <tr>
                  {['Token', 'Scope', 'Of', 'Works until', 'Last used'].map((name) => (
                    <th scope="col" key={name}>
                      {name}
                    </th>
                  ))}
                  <th scope="col">
                    <span className="vh">Actions</span>
                  </th>
                </tr>
              </thead>
              <tbody>
                {tokens.map((token) => (
                  <tr key={token.id}>
                    <th scope="row">{token.name}</th>
                    <td>{token.readOnly ? 'Read' : 'Read and write'}</td>
                    <td>{token.person}</td>
                    <td>{formatDate(token.expiresAt)}</td>
                    <td className="mut">{token.lastUsedAt ? formatAgo(token.lastUsedAt) : 'not yet'}</td>
                    <td className="r">
                      <Button size="small" kind="quiet" onClick={() => setAsking(token)}>
                        Revoke<span className="vh"> {token.name}</span>
                      </Button>
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </div>
        </section>
      )}
      <NewToken url={url} onMade={(token) => setTokens((list) => [token, ...list])} />
      {asking && (
        <ConfirmDialog
          open
          onOpenChange={(open) => !open && setAsking(null)}
          title={`Revoke “${asking.name}”?`}
          confirmLabel="Revoke"
          danger
          onConfirm={async () => {
            await sendJson('DELETE', `${url}/${asking.id}`);
            setTokens((list) => list.filter((one) => one.id !== asking.id));
            toast('The token has stopped working');
          }}
        >
          Whatever uses it is refused from now on.
        </ConfirmDialog>
      )}
    </div>
  );
}
