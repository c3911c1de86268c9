// Package schemas embeds the published JSON Schemas, so that the program that reads documents also serves what
// describes them. Most callers need Files; Recipe is the one that the recipe decoder explains faults by.
package schemas

import "embed"

// Files holds every schema of this folder by its file name.
//
//go:embed *.schema.json
var Files embed.FS

// RulesID is the $id of the schema of rule files; each kind stands under #/$defs/<kind>_file.
const RulesID = "urn:gramlaw:schema:rules"

// RecipeID is the $id of the recipe schema.
const RecipeID = "urn:gramlaw:schema:recipe"

// ReportID is the $id of the report schema.
const ReportID = "urn:gramlaw:schema:report"

// WordingID is the $id of the schema of answers about words.
const WordingID = "urn:gramlaw:schema:wording"

// Recipe is the text of recipe.schema.json.
//
//go:embed recipe.schema.json
var Recipe string
