/** Every stage on a tablet and with large text. */
import { everyStageIn } from './everyStage.ts';

everyStageIn(['tablet-1024x768', 'large-text']);
