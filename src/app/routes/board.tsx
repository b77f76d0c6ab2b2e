import { BoardPage } from '#src/features/board/components/board-page.tsx';

export const Component = BoardPage;
