import { watchDrag } from './drag-watch.ts';

watchDrag();
