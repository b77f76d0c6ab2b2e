import { EditRequestPage } from '#src/features/request/components/request-form-page.tsx';

export const Component = EditRequestPage;
