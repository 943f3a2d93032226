/** Stands in every record; equal to the version in this workspace's package.json (a test holds them together). */
export const DSP_VERSION = '0.1.0';
