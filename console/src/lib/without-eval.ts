import { z } from "zod";

// Schemas are otherwise compiled by `new Function`, which the page's content security policy rightly refuses.
z.config({ jitless: true });
