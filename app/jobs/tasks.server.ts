import type { TaskName, TaskPayloads } from "./enqueue.server.ts";
import { readSheetTask } from "./tasks/readSheet.ts";
import { sendLetterTask } from "./tasks/sendLetter.ts";

/** What does each task: one act of a room, handed the task's payload. */
type Tasks = { [Name in TaskName]: (payload: TaskPayloads[Name]) => Promise<void> };

/** The worker's list of tasks. */
export const tasks: Tasks = {
  readSheet: readSheetTask,
  sendLetter: sendLetterTask,
};
