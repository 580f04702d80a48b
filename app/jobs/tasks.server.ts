import type { TaskName, TaskPayloads } from "./enqueue.server.ts";
import { readSheetTask } from "./tasks/readSheet.ts";
import { sendLetterTask } from "./tasks/sendLetter.ts";

/** What does each task: one act of a room, handed the task's payload. */
type Tasks = { [Name in TaskName]?: (payload: TaskPayloads[Name]) => Promise<void> };

/** The worker's list of tasks. A task without a line here waits in the queue until a worker knows it. */
export const tasks: Tasks = {
  sendLetter: sendLetterTask,
  readSheet: readSheetTask,
};
