import { Pressable, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Words } from '@/components/ui/words.tsx';

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
    <View role="list" style={{ borderTopWidth: 1, borderTopColor: roles.ink }}>
      {accounts.map((account) => (
        <View key={account.mail} role="listitem" style={{ borderBottomWidth: 1, borderBottomColor: roles.rule }}>
          <Pressable
            role="button"
            dataSet={{ look: 'row' }}
            aria-pressed={account.mail === chosen}
            onPress={() => onChoose(account)}
            style={{
              width: '100%',
              minHeight: 56,
              padding: 8,
              justifyContent: 'center',
              backgroundColor: account.mail === chosen ? roles.touched : undefined,
            }}
          >
            <Words style={{ fontFamily: family.readingMedium, fontSize: 17, lineHeight: 22, color: roles.ink }}>
              {`${account.role.slice(0, 1).toUpperCase()}${account.role.slice(1)}, ${account.plant}`}
            </Words>
            <Words style={{ fontFamily: family.reading, fontSize: 15, lineHeight: 22, color: roles.softInk }}>
              {account.mail}
            </Words>
          </Pressable>
        </View>
      ))}
    </View>
  );
}
