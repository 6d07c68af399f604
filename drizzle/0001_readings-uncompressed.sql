-- The content is deflated before it comes here; trying to compress it again costs time and gains nothing.
ALTER TABLE "readings" ALTER COLUMN "content" SET STORAGE EXTERNAL;
