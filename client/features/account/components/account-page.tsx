import type { MemberAnswer } from '#shared/schemas/session.ts';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Time } from '../../../components/ui/time.tsx';
import type { PayoutsArrival } from '../hooks/use-payouts.ts';
import { PayoutsPanel } from './payouts-panel.tsx';
import { ProfileForm } from './profile-form.tsx';

type AccountPageProps = { member: MemberAnswer; arrival: PayoutsArrival };

export function AccountPage({ member, arrival }: AccountPageProps) {
  return (
    <Page title="Account" sub={`Signed in as ${member.email}`}>
      <OfflineNotice />
      {member.suspendedAt && (
        <Notice tone="attention" title="This account is suspended" className="mb-8">
          <p>
            Since <Time at={member.suspendedAt} />. {member.suspensionReason}
          </p>
          <p>Running deals go on to their end; nothing new can be listed or bought.</p>
        </Notice>
      )}
      <div className="grid gap-x-16 gap-y-10 lg:grid-cols-2">
        <section aria-labelledby="payouts-heading">
          <h2 id="payouts-heading" className="mb-4 border-b border-rule pb-2">
            Payouts
          </h2>
          <PayoutsPanel payouts={member.payouts} arrival={arrival} />
        </section>
        <section aria-labelledby="profile-heading">
          <h2 id="profile-heading" className="mb-4 border-b border-rule pb-2">
            Profile
          </h2>
          <ProfileForm key={member.id} member={member} />
        </section>
      </div>
    </Page>
  );
}
