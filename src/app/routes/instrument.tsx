import { InstrumentPage } from '#src/features/equipment/components/instrument-page.tsx';

export const Component = InstrumentPage;
