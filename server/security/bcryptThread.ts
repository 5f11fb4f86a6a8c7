import bcrypt from 'bcryptjs';

/** Runs in a thread of its own, where blocking for half a second is nobody's business. */
export const hash = ({ text, cost }: { text: string; cost: number }): string => bcrypt.hashSync(text, cost);

export const compare = (task: { text: string; hash: string }): boolean => bcrypt.compareSync(task.text, task.hash);
