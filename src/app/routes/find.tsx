import { FindPage } from '#src/features/find/components/find-page.tsx';

export const Component = FindPage;
