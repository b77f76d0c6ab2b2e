import { BookingsPage } from '#src/features/bookings/components/bookings-page.tsx';

export const Component = BookingsPage;
