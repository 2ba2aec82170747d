import { toString } from 'qrcode'

/** Four light modules around a QR (ISO/IEC 18004); decoders forgive less, a dirty screen does not. */
const QUIET_ZONE_MODULES = 4

/** A QR code at error level Q with its quiet zone, as an SVG text without a size of its own. */
export const qrSvg = (text: string): Promise<string> => toString(text, { type: 'svg', errorCorrectionLevel: 'Q', margin: QUIET_ZONE_MODULES })
