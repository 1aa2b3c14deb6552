import { CautionsPage } from '../features/methods/components/cautions-page.tsx';

export const Component = CautionsPage;
