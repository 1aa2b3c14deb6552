import { Skeleton } from './skeleton.tsx';

/** The very first load, before anything of the page is known. */
export function PageWaiting() {
  return (
    <div className="wrap pt-24">
      <Skeleton lines={6} label="Loading the page" />
    </div>
  );
}
