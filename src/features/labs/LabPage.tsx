import { ConventionSection } from './ConventionSection';
import { InvitationsSection } from './InvitationsSection';
import { useLab } from './lab-context';
import { LabSettingsSection } from './LabSettingsSection';
import { MembersSection } from './MembersSection';
import { roleWithArticle } from './role-words';
import { SessionsSection } from './SessionsSection';

/** The lab itself: its people, its convention, its due time. */
export function Component() {
  const { lab, member, may } = useLab();
  return (
    <>
      <title>{`Lab · ${lab.name} · Quarterturn`}</title>
      <header className="mb-6 flex flex-wrap items-baseline gap-x-4 pt-2">
        <h1 className="text-title">{lab.name}</h1>
        <p className="text-ink-2">
          {member.role === 'lead' ? 'You lead it.' : `You are ${roleWithArticle(member.role)} here.`}
          {may('lab.settings') ? '' : ' A lead changes what is on this page.'}
        </p>
      </header>
      <div className="grid grid-cols-1 gap-x-14 gap-y-10 lg:grid-cols-2">
        <div className="space-y-10">
          <MembersSection />
          {may('invitations.manage') && <InvitationsSection />}
        </div>
        <div className="space-y-10">
          <ConventionSection />
          <LabSettingsSection />
          <SessionsSection />
        </div>
      </div>
    </>
  );
}
