import { kernelInfo } from "../info.ts";
import type { Handler } from "../service.ts";

/** kernel_info_request, on shell and control: needs nothing that is slow to load. */
export const kernelInfoRequest: Handler = () => ({ content: kernelInfo() });
