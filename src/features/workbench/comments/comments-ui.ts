import { create } from 'zustand';

import type { CommentPin, CommentQuery } from '@/contract/comments';

interface CommentsUi {
  /** Preset and thread that the address asked for when the rest was set. */
  readonly place: string;
  readonly open: boolean;
  readonly filter: CommentQuery['state'];
  /** The only thread on show: the one that an address or a mail led to. */
  readonly thread: string | null;
  /** Point that the new comment stands on. */
  readonly pin: CommentPin | null;
  set(patch: Partial<Omit<CommentsUi, 'set'>>): void;
}

/** What of the comments is on show; text being written is kept elsewhere. */
export const useCommentsUi = create<CommentsUi>()((set) => ({
  place: '',
  open: false,
  filter: 'open',
  thread: null,
  pin: null,
  set: (patch) => set(patch),
}));
