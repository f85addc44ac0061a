export const attachmentTypes = ["image/jpeg", "image/png", "application/pdf"] as const;
export type AttachmentType = (typeof attachmentTypes)[number];

const openings: Readonly<Record<AttachmentType, readonly number[]>> = {
  "image/jpeg": [0xff, 0xd8, 0xff],
  "image/png": [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a],
  "application/pdf": [0x25, 0x50, 0x44, 0x46, 0x2d],
};

/** What a file is by its first bytes (their formats' own standards); null for anything else. */
export function attachmentTypeOf(content: Uint8Array): AttachmentType | null {
  return (
    attachmentTypes.find((type) => openings[type].every((byte, index) => content[index] === byte)) ?? null
  );
}
