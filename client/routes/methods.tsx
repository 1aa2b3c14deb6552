import { MethodsPage } from '../features/methods/components/methods-page.tsx';

export const Component = MethodsPage;
