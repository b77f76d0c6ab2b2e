import { MetrologyPage } from '#src/features/metrology/components/metrology-page.tsx';

export const Component = MetrologyPage;
