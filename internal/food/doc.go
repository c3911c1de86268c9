// Package food holds what is known about foods and their components: the
// component register (INFOODS tagnames, units, what is part of what), the USDA
// National Nutrient Database for Standard Reference, Release 28, and the USDA
// Table of Nutrient Retention Factors, Release 6.
//
// Most callers need two calls: Lookup turns a tagname into a Component, and
// Find turns a reference such as "sr:01001" into a Food whose Value method
// answers per 100 g edible portion. What was not published is absent, never
// zero.
//
// The tables are embedded in a packed form and read in place; nothing is
// decoded when the program starts. Numbers are exact decimals as published.
//
// Data: USDA Agricultural Research Service, Nutrient Data Laboratory, USDA
// National Nutrient Database for Standard Reference, Release 28, revised May
// 2016 (public domain in the United States), and USDA Table of Nutrient
// Retention Factors, Release 6, December 2007 (CC0 1.0, DOI
// 10.15482/USDA.ADC/1409034). SOURCES.md says more.
package food

//go:generate go run ./register -in register.csv -out register_table.go
