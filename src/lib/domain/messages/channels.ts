/**
 * The ways out of the product. Voice is the last one, for calls for help alone: a telephone that rings and waits for a
 * digit where a text did not get through.
 */
export const MESSAGE_CHANNELS = ['sms', 'mail', 'voice'] as const;
export type MessageChannel = (typeof MESSAGE_CHANNELS)[number];
