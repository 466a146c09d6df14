import type { Why } from './protocol';

const sentences: Record<Why, string> = {
  invalid: 'A value in it is not one the shop can store.',
  unknown_table: 'The server does not know this kind of record yet.',
  unknown_parent: 'What it belongs to is not in this shop.',
  unknown_record: 'The record it changes is not in this shop.',
  parent_rejected: 'What it belongs to was set aside.',
  parent_held: 'What it belongs to waits for the supervisor.',
  not_by_device: 'That is done at the desk, signed in, not from a bench device.',
  newer_version: 'It was written by a newer version of the app than the server knows.',
  exists_differently: 'A different record already has this id.',
  fixed_field: 'That part of a record never changes once it is saved.',
  changed_since_seen: 'The session changed since it was looked at. Look at it again, then hand it in.',
  deleted_meanwhile: 'Somebody deleted it meanwhile.',
  differs: 'Somebody else changed the same value without seeing this change.',
  session_closed: 'The session was already handed in or approved. The supervisor decides.',
  account_closed: 'The person’s account is closed. The supervisor decides.',
  device_revoked: 'This device was shut out by the shop. The supervisor decides.',
  unknown_person: 'The person it names is not in this shop.',
};

/** The sentence a person sees for a verdict's reason. */
export function whySentence(why: Why): string {
  return sentences[why];
}
