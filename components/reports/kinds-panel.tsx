import { reportsText, troubleNames } from '@/components/text/reports.ts';
import { Facts } from '@/components/ui/facts.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { troubleKinds, type Report } from '@/shared/reports.ts';

/** How often each kind of trouble was reported, the most frequent first. */
export function KindsPanel({ reports }: { readonly reports: readonly Report[] }) {
  const counts = troubleKinds
    .map((kind) => {
      const these = reports.filter((report) => report.kind === kind);
      return { kind, all: these.length, open: these.filter((report) => report.closed === null).length };
    })
    .filter(({ all }) => all > 0)
    .toSorted((a, b) => b.all - a.all);
  return (
    <Panel title={reportsText.kinds}>
      <Facts
        items={counts.map(({ kind, all, open }) => ({
          label: troubleNames[kind],
          value: reportsText.kindCount(open, all),
        }))}
      />
    </Panel>
  );
}
