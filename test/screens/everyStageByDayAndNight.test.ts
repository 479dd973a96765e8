/** Every stage by day and by night. */
import { everyStageIn } from './everyStage.ts';

everyStageIn(['day-1280x800', 'night-1280x800']);
