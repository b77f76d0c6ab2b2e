import { RequestsPage } from '#src/features/requests/components/requests-page.tsx';

export const Component = RequestsPage;
