import { useMutation, useQueryClient, useSuspenseQuery } from '@tanstack/react-query';
import { Form, useSearchParams } from 'react-router-dom';
import { suspendRequest, type DeskMemberAnswer } from '#shared/schemas/desk.ts';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/inputs.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { membersQuery, sendReinstate, sendSuspend } from '../api/members.ts';
import { DeskPage } from './desk-page.tsx';
import { ReasonForm } from './reason-form.tsx';

function useMembersRefresh() {
  const client = useQueryClient();
  return (said: string) => {
    confirmDone(said);
    return client.invalidateQueries({ queryKey: ['desk'] });
  };
}

function Suspend({ member }: { member: DeskMemberAnswer }) {
  const refresh = useMembersRefresh();
  return (
    <details>
      <summary className="py-1 font-medium">Suspend {member.displayName}</summary>
      <div className="mt-3 max-w-prose">
        <ReasonForm
          label={`Suspend ${member.displayName}`}
          fieldLabel="Reason"
          hint="The member reads it; it stands in the audit trail."
          schema={suspendRequest}
          send={(input) => sendSuspend(member.id, input)}
          onDone={() => refresh(`${member.displayName} is suspended.`)}
          look="danger"
          submitText={`Suspend ${member.displayName}`}
          question="Suspend this account?"
          counterparty={member.displayName}
          consequence="Every session ends at once. The account can look, but not act. Running deals keep their deadlines."
          confirmText={`Suspend ${member.displayName}`}
        />
      </div>
    </details>
  );
}

function Reinstate({ member }: { member: DeskMemberAnswer }) {
  const refresh = useMembersRefresh();
  const act = useMutation({
    mutationFn: () => sendReinstate(member.id),
    onSuccess: () => refresh(`${member.displayName} can act again.`),
  });
  return (
    <div>
      <Button look="second" busy={act.isPending} onClick={() => act.mutate()}>
        Lift the suspension of {member.displayName}
      </Button>
      {act.isError && (
        <p role="alert" className="mt-2 text-litharge">
          {act.error.message}
        </p>
      )}
    </div>
  );
}

function MemberRow({ member }: { member: DeskMemberAnswer }) {
  return (
    <li className="flex flex-col gap-2 border-b border-rule py-4">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
        <h3>{member.displayName}</h3>
        <span className="text-ink-2">
          {member.region}; {member.role}
        </span>
        {member.suspendedAt && <Stamp tone="attention">suspended</Stamp>}
      </div>
      {member.suspendedAt && (
        <p className="max-w-prose text-ink-2">
          Since <Time at={member.suspendedAt} />: {member.suspensionReason}
        </p>
      )}
      {member.can.suspend && <Suspend member={member} />}
      {member.can.reinstate && <Reinstate member={member} />}
    </li>
  );
}

/** Finding a member, to suspend or to lift a suspension. The search stands in the address. */
export function MembersPage() {
  const [params] = useSearchParams();
  const text = params.get('query')?.trim() ?? '';
  const { data } = useSuspenseQuery(membersQuery(text));
  return (
    <DeskPage title="Members">
      <Form role="search" className="mb-8 flex max-w-xl flex-wrap items-end gap-3">
        <Field
          id="member-query"
          label="Name or e-mail"
          hint="A part of the name, or the whole e-mail address. Empty: all who are suspended."
          optional
          className="grow"
        >
          {(ties) => <TextInput key={text} {...ties} name="query" type="search" defaultValue={text} />}
        </Field>
        <Button type="submit">Find</Button>
      </Form>
      <section aria-labelledby="found-heading">
        <h2 id="found-heading" className="mb-2">
          {text === '' ? 'Suspended members' : `Found for “${text}”`}
        </h2>
        {data.members.length === 0 ? (
          <EmptyState title={text === '' ? 'Nobody is suspended' : 'No member fits'} />
        ) : (
          <ul className="border-t border-rule">
            {data.members.map((member) => (
              <MemberRow key={member.id} member={member} />
            ))}
          </ul>
        )}
      </section>
    </DeskPage>
  );
}
