CREATE TABLE "sign_ups" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"token_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "sign_ups_token_unique" UNIQUE("token_hash"),
	CONSTRAINT "sign_ups_email_lower" CHECK ("sign_ups"."email" = lower("sign_ups"."email") and length("sign_ups"."email") <= 254)
);
--> statement-breakpoint
CREATE INDEX "sign_ups_expiry" ON "sign_ups" USING btree ("expires_at");