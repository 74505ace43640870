/** A certificate of this very revision was withdrawn: the reading has to be put right before there is another. */
export class CertificateWithdrawn extends Error {}
