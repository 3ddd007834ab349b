import { ActButton } from '@/app/_components/ui/act-button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatInstant, formatIsoDate } from '@/app/_components/ui/format-time';
import { revokeTokenAction } from '../actions';

export interface TokenLine {
  readonly id: string;
  readonly name: string;
  readonly scopes: readonly string[];
  readonly createdAt: string;
  readonly lastUsedAt: string | null;
  readonly expiresAt: string | null;
  readonly isExpired: boolean;
}

export function TokenTable({ tokens }: { readonly tokens: readonly TokenLine[] }) {
  return (
    <DataTable
      caption="Your API tokens"
      head={
        <tr>
          <HeadCell>For</HeadCell>
          <HeadCell>May</HeadCell>
          <HeadCell>Made</HeadCell>
          <HeadCell>Last used</HeadCell>
          <HeadCell>Valid until</HeadCell>
          <HeadCell>
            <span className="sr-only">Revoke</span>
          </HeadCell>
        </tr>
      }
    >
      {tokens.map((token) => (
        <Row key={token.id}>
          <Cell heading wrap>
            {token.name}
          </Cell>
          <Cell>{token.scopes.includes('write') ? 'read, write' : 'read'}</Cell>
          <Cell mono>{formatIsoDate(token.createdAt)}</Cell>
          <Cell mono>{token.lastUsedAt === null ? 'never' : formatInstant(token.lastUsedAt)}</Cell>
          <Cell mono>
            {token.expiresAt === null ? 'no end' : formatIsoDate(token.expiresAt)}
            {token.isExpired ? ' (expired)' : ''}
          </Cell>
          <Cell>
            <ActButton
              action={revokeTokenAction}
              values={{ token: token.id }}
              look="bad"
              label={`Revoke the token for ${token.name}`}
              confirm={{
                title: 'Revoke this token?',
                text: `Programs that use the token for ${token.name} are refused from now on. It cannot be undone.`,
                yes: 'Revoke it',
              }}
            >
              Revoke
            </ActButton>
          </Cell>
        </Row>
      ))}
    </DataTable>
  );
}
