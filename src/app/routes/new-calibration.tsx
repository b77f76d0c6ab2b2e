import { RecordPage } from '#src/features/metrology/components/record-page.tsx';

export const Component = RecordPage;
