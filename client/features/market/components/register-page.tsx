import { useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import { LinkButton } from '../../../components/ui/button.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { filtersFromSearch, isNarrowed, plainFilters, registerHref } from '../register-filters.ts';
import { RegisterFilterBar } from './register-filter-bar.tsx';
import { RegisterList } from './register-list.tsx';

/** All open lots, aligned so that they can be compared. */
export function RegisterPage() {
  const [search] = useSearchParams();
  const filters = useMemo(() => filtersFromSearch(search), [search]);
  return (
    <Page
      title="Register of lots"
      sub="Refined metal with its mass, its fineness, and what stands behind both"
      aside={
        isNarrowed(filters) && (
          <LinkButton look="quiet" to={registerHref(plainFilters(filters.sort))}>
            Show every open lot
          </LinkButton>
        )
      }
    >
      <OfflineNotice />
      <RegisterFilterBar filters={filters} />
      <RegisterList filters={filters} />
    </Page>
  );
}
