/** Whether the box that finds anything is open. */
import { create } from 'zustand';

export const useFind = create<{ readonly open: boolean }>()(() => ({ open: false }));
