import { Link } from 'react-router-dom';
import { paths } from '../api/paths.ts';

const tabs = [
  { key: 'chain', words: 'Chain', to: paths.study },
  { key: 'log', words: 'Decision log', to: paths.decisionLog },
  { key: 'members', words: 'Members', to: paths.members },
] as const;

/** The pages of one study. */
export function StudyHeader({
  studyId,
  current,
}: {
  readonly studyId: string;
  readonly current: (typeof tabs)[number]['key'];
}) {
  return (
    <nav aria-label="Pages of the study" className="flex gap-4 border-b border-rule text-sm">
      {tabs.map((tab) => (
        <Link
          key={tab.key}
          to={tab.to(studyId)}
          aria-current={tab.key === current ? 'page' : undefined}
          className={`flex min-h-9 items-center border-b-4 font-semibold ${tab.key === current ? 'border-ink' : 'border-transparent text-ink-2 hover:text-ink'}`}
        >
          {tab.words}
        </Link>
      ))}
    </nav>
  );
}
