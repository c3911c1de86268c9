// Package wording reads the words on a food pack: which claim of which law they are.
//
// Of takes a book's languages and laws; Engine.Read gives the frames of a text (what is said of which component, with number, basis and
// food compared with), knowing words but no law; Engine.Judge gives, for one law, the readings: frames with the claim they are, how they
// were matched, and what is nearest where they are none. All words stand in rules/words and rules/<market>/wording.json.
//
// A text is cut into tokens; patterns are tries over tokens whose slots (a component, a number, a list) are found once per place. Of all
// ways to cover the text with patterns the one is taken that leaves the fewest tokens unread. Everything is linear in the text: patterns
// and slots have bounded lengths. Spans are code points of the text as it was given.
package wording
