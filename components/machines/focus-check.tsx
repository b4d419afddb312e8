import { profileText } from '@/components/text/machines.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Panel } from '@/components/ui/panel.tsx';

/** How the focus dial is checked at the machine, step by step. */
export function FocusCheck() {
  return (
    <Panel title={profileText.focusCheck.title}>
      <ol
        style={{
          margin: 0,
          paddingLeft: 22,
          display: 'flex',
          flexDirection: 'column',
          gap: 10,
          fontFamily: family.reading,
          fontSize: 17,
          lineHeight: '25px',
          color: roles.ink,
        }}
      >
        {profileText.focusCheck.words.map((words) => (
          <li key={words}>{words}</li>
        ))}
      </ol>
    </Panel>
  );
}
