import { LoadPage } from '#src/features/bookings/components/load-page.tsx';

export const Component = LoadPage;
