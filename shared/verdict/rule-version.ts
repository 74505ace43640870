/** Stored with every verdict; raised when the rules in this folder change what they give. */
export const RULE_VERSION = 'verdict/2'
