/** Words used on every screen. */
export const common = {
  product: 'Hummock',
  stop: 'Stop',
  undo: 'Undo',
  cancel: 'Cancel',
  close: 'Close',
  copyDetails: 'Copy details',
  reference: (requestId: string) => `Reference ${requestId}`,
} as const;
