import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

export type DemoAccount = { readonly mail: string; readonly role: string; readonly plant: string };

/** The demo's accounts as a list to tap. */
export function DemoAccounts({
  accounts,
  chosen,
  onChoose,
}: {
  readonly accounts: readonly DemoAccount[];
  readonly chosen: string | null;
  readonly onChoose: (account: DemoAccount) => void;
}) {
  return (
    <ul style={{ listStyle: 'none', margin: 0, padding: 0, borderTop: `1px solid ${roles.ink}` }}>
      {accounts.map((account) => (
        <li key={account.mail} style={{ borderBottom: `1px solid ${roles.rule}` }}>
          <button
            type="button"
            className="cp-row"
            aria-pressed={account.mail === chosen}
            onClick={() => onChoose(account)}
            style={{
              display: 'block',
              width: '100%',
              minHeight: 56,
              padding: '8px 8px',
              border: 0,
              background: account.mail === chosen ? roles.touched : 'transparent',
              textAlign: 'left',
              cursor: 'pointer',
              color: roles.ink,
              fontFamily: family.readingMedium,
              fontSize: 17,
              lineHeight: '22px',
            }}
          >
            {`${account.role.slice(0, 1).toUpperCase()}${account.role.slice(1)}, ${account.plant}`}
            <span style={{ display: 'block', fontFamily: family.reading, fontSize: 15, color: roles.softInk }}>
              {account.mail}
            </span>
          </button>
        </li>
      ))}
    </ul>
  );
}
