import { MissingPage } from '../app/error-page.tsx';

export const Component = MissingPage;
