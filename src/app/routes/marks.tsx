import { GalleryPage } from '#src/features/gallery/components/gallery-page.tsx';

export const Component = GalleryPage;
