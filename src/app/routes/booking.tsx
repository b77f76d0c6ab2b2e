import { BookingPage } from '#src/features/bookings/components/booking-page.tsx';

export const Component = BookingPage;
