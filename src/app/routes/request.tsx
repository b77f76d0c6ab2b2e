import { RequestPage } from '#src/features/request/components/request-page.tsx';

export const Component = RequestPage;
