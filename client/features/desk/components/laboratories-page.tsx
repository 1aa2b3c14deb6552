import { useSuspenseQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import type { LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { LinkButton } from '../../../components/ui/button.tsx';
import { DataList } from '../../../components/ui/data-list.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { formatDate } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { laboratoriesQuery } from '../api/laboratories.ts';
import { DeskPage } from './desk-page.tsx';
import { LaboratoryForm } from './laboratory-form.tsx';

function Entry({ laboratory }: { laboratory: LaboratoryAnswer }) {
  return (
    <li className="flex flex-col gap-3 border-b border-rule py-4">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
        <h3>{laboratory.name}</h3>
        <Stamp tone={laboratory.isActive ? 'good' : 'attention'}>
          {laboratory.isActive ? 'active' : 'not active'}
        </Stamp>
      </div>
      <DataList
        rows={[
          {
            term: 'Accreditation',
            data: (
              <>
                {laboratory.accreditationBody} <span className="fig">{laboratory.accreditationNumber}</span>
              </>
            ),
          },
          { term: 'Valid until', data: formatDate(laboratory.validUntil) },
          { term: 'Scope', data: laboratory.scope },
          { term: 'Region', data: laboratory.region },
          { term: 'Reached by', data: laboratory.contact },
        ]}
      />
      <div>
        <LinkButton
          to={`${paths.deskLaboratories()}?change=${laboratory.id}`}
          look="second"
          aria-label={`Change ${laboratory.name}`}
        >
          Change
        </LinkButton>
      </div>
    </li>
  );
}

/** The register of laboratories. Which entry is being written stands in the address. */
export function LaboratoriesPage() {
  const { data: laboratories } = useSuspenseQuery(laboratoriesQuery);
  const [params, setParams] = useSearchParams();
  const changing = laboratories.find(({ id }) => id === params.get('change')) ?? null;
  if (changing !== null || params.has('add')) {
    return (
      <DeskPage title={changing === null ? 'A laboratory for the register' : `Change ${changing.name}`}>
        <div className="flex max-w-xl flex-col gap-6">
          <LaboratoryForm key={changing?.id} laboratory={changing} onSaved={() => setParams({})} />
          <LinkButton to={paths.deskLaboratories()} look="quiet" className="self-start">
            Back to the register
          </LinkButton>
        </div>
      </DeskPage>
    );
  }
  return (
    <DeskPage title="Laboratories" sub="Only a laboratory that stands here can back a certified lot.">
      <LinkButton to={`${paths.deskLaboratories()}?add`} className="mb-6">
        Add a laboratory
      </LinkButton>
      {laboratories.length === 0 ? (
        <EmptyState title="No laboratory is registered yet" />
      ) : (
        <ul className="border-t border-rule">
          {laboratories.map((laboratory) => (
            <Entry key={laboratory.id} laboratory={laboratory} />
          ))}
        </ul>
      )}
    </DeskPage>
  );
}
