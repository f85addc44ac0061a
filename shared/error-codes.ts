/**
 * Every code the service can answer with: the one list. The error exit writes from it, the OpenAPI document and
 * /v1/problems list it, and a test holds both against it. The same code always asks the same thing of the client.
 */
export interface ProblemKind {
  readonly status: number;
  /** Constant sentence; what varies goes in `detail` and in members of its own. */
  readonly title: string;
  /** One imperative sentence: what the client does about it. */
  readonly fix: string;
}

const kind = (status: number, title: string, fix: string): ProblemKind => ({ status, title, fix });

export const problemKinds = {
  // 400: cannot be parsed
  invalid_json: kind(400, "The body is not JSON", "Send one JSON value in UTF-8."),
  duplicate_key: kind(400, "A member name stands twice in one object", "Send each member once."),
  too_deep: kind(400, "The body is nested too deeply", "Send at most 32 levels."),
  invalid_encoding: kind(400, "The body or the address is not valid UTF-8", "Encode text as UTF-8."),
  malformed_request: kind(400, "The request is not well-formed HTTP", "Correct the client."),
  unknown_parameter: kind(
    400,
    "A query parameter is not known here",
    "Use the parameters that the operation lists.",
  ),
  invalid_parameter: kind(400, "A query parameter cannot be used", "Correct the parameter named in errors."),
  invalid_header: kind(400, "A request header cannot be used", "Correct the header named in errors."),
  invalid_cursor: kind(400, "The cursor does not belong to this list", "Start again without a cursor."),
  credential_in_url: kind(
    400,
    "A credential was sent in the address",
    "Send it as Authorization: Bearer; revoke it, since addresses are logged.",
  ),
  // 401, 403
  credential_missing: kind(
    401,
    "No credential was sent",
    "Send an API key or an access token as Authorization: Bearer.",
  ),
  credential_invalid: kind(401, "The credential is not valid", "Check the key, or sign in again."),
  key_expired: kind(401, "The API key has expired", "Issue a new key."),
  key_revoked: kind(401, "The API key is revoked", "Issue a new key."),
  session_expired: kind(401, "The session has ended", "Sign in again."),
  sign_in_refused: kind(401, "E-mail or password is wrong", "Check both and try again."),
  scope_missing: kind(
    403,
    "The credential may not do this",
    "Use a credential with the scope named in the answer.",
  ),
  member_required: kind(403, "Only a signed-in member may do this", "Sign in; a key cannot sign."),
  origin_refused: kind(403, "The request came from another origin", "Call from the console's own address."),
  // 404, 405, 406, 409, 412, 413, 415, 422 of the protocol, 428, 429
  not_found: kind(404, "There is nothing here", "Check the address and the id."),
  method_not_allowed: kind(405, "This address does not take that method", "Use a method listed in Allow."),
  not_acceptable: kind(
    406,
    "None of the accepted media types can be served",
    "Accept one of those that the detail names.",
  ),
  request_timeout: kind(408, "The request took too long to arrive", "Send it again."),
  idempotency_in_progress: kind(
    409,
    "A call with this Idempotency-Key is still running",
    "Wait as Retry-After says and send it again.",
  ),
  secret_already_shown: kind(
    409,
    "The secret of this call was shown once already",
    "Use the secret you were shown, or revoke it and issue another.",
  ),
  email_taken: kind(409, "A member with this e-mail exists", "Use another e-mail."),
  last_admin: kind(
    409,
    "An organisation keeps at least one active administrator",
    "Make another member administrator first.",
  ),
  machine_archived: kind(409, "The machine is archived", "Restore the machine, or choose another."),
  job_signed: kind(
    409,
    "The job is signed and changes no more",
    "Make a new revision of the job, with a reason.",
  ),
  job_not_signed: kind(409, "The job is not signed", "Change it as it stands, or sign it first."),
  survey_not_computed: kind(409, "The survey has not been computed", "Compute the survey first."),
  sign_off_blocked: kind(
    409,
    "Something stands in the way of the signature",
    "Settle every point named in obstacles.",
  ),
  entry_not_withdrawable: kind(409, "This entry cannot be withdrawn", "Add an entry that puts it right."),
  webhook_limit_reached: kind(
    409,
    "The organisation has as many webhooks as it may have",
    "Remove one that is no longer used.",
  ),
  webhook_inactive: kind(409, "The webhook is switched off", "Switch it on first: PATCH active."),
  version_stale: kind(
    412,
    "The resource has changed since it was read",
    "Read it again and repeat the change.",
  ),
  call_too_large: kind(
    413,
    "The call is larger than the service takes",
    "Split the call; the limit is named in the answer.",
  ),
  media_type_unsupported: kind(
    415,
    "The body's media type is not taken",
    "Send Content-Type: application/json.",
  ),
  idempotency_key_reused: kind(
    422,
    "The Idempotency-Key was used with another body",
    "Use a new key for a new call.",
  ),
  precondition_required: kind(428, "The change needs If-Match", "Send the ETag of the version you read."),
  rate_limited: kind(429, "Too many calls", "Wait as Retry-After says."),
  headers_too_large: kind(431, "The request headers are too large", "Send fewer or shorter headers."),
  // 422: parsed, but breaks the schema
  several_faults: kind(422, "The call has faults of several kinds", "Correct each place that errors names."),
  required: kind(422, "A required member is missing", "Add the member."),
  units_missing: kind(
    422,
    "The units are not stated",
    "State units: a reading taken in mil and read as mm can wreck a machine.",
  ),
  unknown_field: kind(422, "A member is not known here", "Remove it or correct its name."),
  wrong_type: kind(422, "A member has the wrong type", "Send the type that the schema states."),
  number_not_finite: kind(
    422,
    "A number is not finite or cannot be held",
    "Send a finite number that a 64-bit float can hold.",
  ),
  number_not_exact: kind(
    422,
    "An integer is too large to be held exactly",
    "Send integers within plus or minus 9007199254740991.",
  ),
  out_of_range: kind(422, "A value is outside its range", "Send a value inside allowed."),
  too_few_items: kind(422, "A list has too few items", "Add items."),
  too_many_items: kind(422, "A list has too many items", "Split the call."),
  text_invalid: kind(422, "A text has a form that is not taken", "Correct the text."),
  choice_unknown: kind(422, "A value is none of those allowed", "Use one of the values in detail."),
  duplicate_id: kind(422, "An id stands twice", "Give each item an id of its own."),
  unknown_reference: kind(422, "An id refers to nothing in this call", "Correct the id."),
  combination_invalid: kind(422, "Members do not go together", "Follow the detail."),
  password_weak: kind(
    422,
    "The password is too short or too common",
    "Choose at least 12 characters that nobody would guess.",
  ),
  password_wrong: kind(422, "The password is not the signing member's", "Enter your own password again."),
  file_not_as_stated: kind(
    422,
    "The file is not what its media type says",
    "Send the file with the Content-Type of what it holds.",
  ),
  reason_required: kind(
    422,
    "The order is unusual and asks for a reason",
    "Send reason: it is kept with the move.",
  ),
  webhook_target_refused: kind(
    422,
    "Nothing is sent to that address",
    "Use an https address on the public network, or have this network allowed by whoever runs the service.",
  ),
  invitation_invalid: kind(
    422,
    "The link is used, expired or not valid",
    "Ask an administrator for a new one.",
  ),
  // 422: parsed and well formed, but the engine refuses
  too_few_points: kind(422, "There are fewer readings than the fit needs", "Take more readings."),
  points_collinear: kind(422, "The points lie in a line", "Take readings round the bore."),
  points_coincident: kind(422, "The points are all at one place", "Check the readings."),
  arc_too_flat: kind(422, "The arc is too flat for a circle", "Take readings over a longer arc."),
  no_inscribed_circle: kind(
    422,
    "No inscribed circle lies between the readings",
    "Take readings over more than half of the bore, or choose another criterion.",
  ),
  coverage_insufficient: kind(
    422,
    "The readings do not cover enough of the bore",
    "Take readings over a longer arc, or choose another method.",
  ),
  angles_insufficient: kind(
    422,
    "The clock angles do not determine the fit",
    "Read at two or more well-spread clock angles.",
  ),
  uncertainty_incomplete: kind(
    422,
    "Uncertainty is stated for some readings only",
    "State it for all or for none.",
  ),
  radius_not_positive: kind(
    422,
    "A wall distance is not positive",
    "Check nominal diameter, sense and readings.",
  ),
  rank_deficient: kind(422, "The data do not determine the unknowns", "Add data that separate them."),
  not_converged: kind(
    422,
    "The solver did not converge",
    "Check the readings; report the record id if they are sound.",
  ),
  result_overflow: kind(
    422,
    "A result is too large for a number",
    "Check the size and the units of the input.",
  ),
  covariance_not_positive: kind(422, "A covariance is not positive semidefinite", "Check the covariance."),
  stations_coincident: kind(
    422,
    "Reference stations stand at one z",
    "Choose reference stations apart along z.",
  ),
  reference_count: kind(
    422,
    "The number of reference stations does not fit the method",
    "Name as many as the method takes.",
  ),
  tolerance_invalid: kind(
    422,
    "A tolerance cannot be used",
    "Send a positive half-width, or [min, max] with min below max.",
  ),
  weights_incomplete: kind(
    422,
    "Covariances or weights are given for some reference stations only",
    "Give them for all or for none.",
  ),
  supports_insufficient: kind(
    422,
    "The supports cannot make the movement",
    "Add supports or free a direction.",
  ),
  shaft_unsupported: kind(
    422,
    "The shaft is not held by its supports",
    "Give two or more supports apart from each other on the shaft.",
  ),
  too_many_choices: kind(
    422,
    "The choice of shims is too large to search",
    "Use fewer stock sizes or stacks.",
  ),
  not_available: kind(
    422,
    "This engine version does not compute that yet",
    "Use the members that the documentation lists.",
  ),
  // 5xx
  internal_error: kind(500, "The service failed", "Send it again; if it fails again, report the requestId."),
  mail_refused: kind(
    502,
    "The mail server refused the mail",
    "Check the recipients; whoever runs the service finds the server's answer in its log.",
  ),
  mail_unavailable: kind(503, "The mail server cannot be reached", "Nothing was sent; try again later."),
  unavailable: kind(503, "The service cannot answer just now", "Wait as Retry-After says."),
} as const satisfies Record<string, ProblemKind>;

export type ProblemCode = keyof typeof problemKinds;
export const problemCodes = Object.keys(problemKinds) as ProblemCode[];

/** One thing wrong with a request, at one place of it. */
export interface Fault {
  /** RFC 6901 pointer into the body: `/bores/0/points`. Empty for the body as a whole. */
  readonly pointer: string;
  readonly code: ProblemCode;
  readonly detail: string;
  readonly value?: unknown;
  readonly unit?: string;
  readonly allowed?: { readonly min?: number; readonly max?: number; readonly unit?: string };
}
