package recheck

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"strings"
	"sync"

	"gocloud.dev/blob"
	"gocloud.dev/gcerrors"

	"gramlaw/internal/recipe"
)

// attempts is how often an object is asked for before it counts as lost.
const attempts = 4

// try repeats what may go better next time.
func (w *work) try(ctx context.Context, what func() error) error {
	var err error
	for n := range attempts {
		if n > 0 && w.Wait != nil {
			select {
			case <-w.Wait(n):
			case <-ctx.Done():
				return ctx.Err()
			}
		}
		if err = what(); err == nil || ctx.Err() != nil || lasting(err) {
			return err
		}
	}
	return err
}

// lasting tells whether an error will be there again.
func lasting(err error) bool {
	switch gcerrors.Code(err) {
	case gcerrors.NotFound, gcerrors.PermissionDenied, gcerrors.InvalidArgument, gcerrors.FailedPrecondition, gcerrors.Unimplemented:
		return true
	}
	return false
}

func (w *work) page(ctx context.Context, token []byte) (objects []*blob.ListObject, next []byte, err error) {
	err = w.try(ctx, func() error {
		objects, next, err = w.Recipes.ListPage(ctx, token, 1000, nil)
		return err
	})
	return objects, next, err
}

// read reads an object of at most a recipe document's length.
func (w *work) read(ctx context.Context, key string) (doc []byte, err error) {
	err = w.try(ctx, func() error {
		r, err := w.Recipes.NewReader(ctx, key, nil)
		if err != nil {
			return err
		}
		defer r.Close()
		doc, err = io.ReadAll(io.LimitReader(r, recipe.MaxBytes+1))
		return err
	})
	return doc, err
}

// write writes an object whole, or not at all.
func (w *work) write(ctx context.Context, key string, content func(io.Writer) error) error {
	return w.try(ctx, func() error {
		ctx, stop := context.WithCancel(ctx)
		defer stop()
		to, err := w.Out.NewWriter(ctx, key, nil)
		if err != nil {
			return err
		}
		if err := content(to); err != nil {
			stop() // an unfinished object is dropped
			return errors.Join(err, to.Close())
		}
		return to.Close()
	})
}

// recipe compares one recipe in every step.
func (w *work) recipe(ctx context.Context, o *blob.ListObject) ([]Found, *Failure) {
	fail := func(code, says string, faults recipe.Faults) ([]Found, *Failure) {
		f := &Failure{Key: o.Key, Code: code, Says: says}
		for _, one := range faults {
			f.Faults = append(f.Faults, Fault{one.Pointer, one.Code, one.Says})
		}
		return nil, f
	}
	if o.Size > recipe.MaxBytes {
		return fail("too-large", fmt.Sprintf("the document has %d bytes; at most %d are read", o.Size, recipe.MaxBytes), nil)
	}
	doc, err := w.read(ctx, o.Key)
	if err != nil {
		return fail("storage", "the document cannot be read: "+gcerrors.Code(err).String(), nil)
	}
	r, faults := recipe.Decode(doc)
	if len(faults) > 0 {
		return fail("document", "the document is refused", faults)
	}
	if says, faults := w.own.settle(ctx, r); says != "" {
		return fail("own-ingredient", says, faults)
	}
	var out []Found
	for _, s := range w.Steps {
		outcome, faults := s.Plan.Recipe(r)
		if len(faults) > 0 {
			return fail("check", "the recipe cannot be checked", faults)
		}
		if outcome.Changed() {
			out = append(out, Found{Key: o.Key, From: s.From, To: s.To, Outcome: *outcome})
		}
	}
	return out, nil
}

// own are the maker's own ingredients: what own/NAME.json says of an ingredient stands in every recipe that has "food": "own:NAME".
type own struct {
	w    *work
	mu   sync.Mutex
	read map[string]*ownIngredient
}

type ownIngredient struct {
	in     *recipe.Ingredient
	says   string // why there is none
	faults recipe.Faults
}

// settle puts own ingredients into a recipe. says tells why it could not.
func (o *own) settle(ctx context.Context, r *recipe.Recipe) (says string, faults recipe.Faults) {
	recipe.OwnFoods(r, func(in *recipe.Ingredient, name string) {
		if says != "" {
			return
		}
		found := o.ingredient(ctx, name)
		if says, faults = found.says, found.faults; says == "" {
			in.Take(found.in)
		}
	})
	return says, faults
}

func (o *own) ingredient(ctx context.Context, name string) *ownIngredient {
	o.mu.Lock()
	defer o.mu.Unlock()
	if found, ok := o.read[name]; ok {
		return found
	}
	key := ownPrefix + name + ".json"
	found := &ownIngredient{}
	doc, err := o.w.read(ctx, key)
	switch {
	case gcerrors.Code(err) == gcerrors.NotFound:
		found.says = key + " is not in the store"
	case err != nil:
		found.says = key + " cannot be read: " + gcerrors.Code(err).String()
	default:
		found.in, found.faults = ownDocument(name, doc)
		if len(found.faults) > 0 {
			found.says = key + " is refused"
		}
	}
	if ctx.Err() == nil {
		o.read[name] = found
	}
	return found
}

// ownDocument reads an ingredient without id and amount: as the only one of a recipe.
func ownDocument(name string, doc []byte) (*recipe.Ingredient, recipe.Faults) {
	body := bytes.TrimSpace(doc)
	if !bytes.HasPrefix(body, []byte("{")) {
		return nil, recipe.Faults{{Pointer: "", Code: recipe.WrongType, Says: "an object is wanted: an ingredient without id and amount"}}
	}
	comma := ","
	if bytes.HasPrefix(bytes.TrimSpace(body[1:]), []byte("}")) {
		comma = ""
	}
	whole := `{"id":"own","name":"own","ingredients":[{"id":"own","amount":"100 g"` + comma + string(body[1:]) + `]}`
	r, faults := recipe.Decode([]byte(whole))
	for i := range faults {
		faults[i].Pointer = strings.TrimPrefix(faults[i].Pointer, "/ingredients/0")
	}
	if len(faults) > 0 {
		return nil, faults
	}
	return &r.Ingredients[0], nil
}
