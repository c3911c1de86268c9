package infra

import (
	"bytes"
	"fmt"
	"go/parser"
	"go/token"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/web"
)

// attributes are what GetAtt may ask of the types that the template asks.
// Reference: CloudFormation and SAM resource references, "Return values".
var attributes = map[string][]string{
	"AWS::KMS::Key": {"Arn"}, "AWS::S3::Bucket": {"Arn"}, "AWS::Logs::LogGroup": {"Arn"}, "AWS::IAM::Role": {"Arn"},
	"AWS::Serverless::Function": {"Arn"}, "AWS::Lambda::Url": {"FunctionUrl"},
}

// Every name that is used is defined, every parameter and condition that is defined is used.
func TestNamesResolve(t *testing.T) {
	tpl := load(t, "template.yaml")
	uses := references(tpl.whole)
	for name, r := range tpl.Resources {
		for _, d := range r.DependsOn {
			uses = append(uses, reference{"Ref", d, ""})
		}
		if r.Type == "" || len(r.Properties) == 0 {
			t.Errorf("%s has no type or no properties", name)
		}
	}
	seen := map[string]bool{}
	for _, u := range uses {
		seen[u.name] = true
		if !tpl.resolves(u) {
			t.Errorf("%s of %s %s: there is none", u.kind, u.name, u.attribute)
		}
	}
	for _, defined := range []map[string]any{tpl.Parameters, tpl.Conditions} {
		for name := range defined {
			if !seen[name] {
				t.Errorf("%s is never used", name)
			}
		}
	}
}

func (t *template) resolves(u reference) bool {
	_, parameter := t.Parameters[u.name]
	r, known := t.Resources[u.name]
	_, condition := t.Conditions[u.name]
	switch u.kind {
	case "GetAtt":
		return slices.Contains(attributes[r.Type], u.attribute)
	case "Condition":
		return condition
	}
	return known || parameter || t.generated(u.name) || slices.Contains([]string{"AWS::AccountId", "AWS::Partition", "AWS::Region", "AWS::StackName", "AWS::URLSuffix"}, u.name)
}

// generated tells whether SAM makes a resource of that name: the alias of a function.
func (t *template) generated(name string) bool {
	for _, f := range t.ofType("AWS::Serverless::Function") {
		if name == f+"Alias"+text(t.Resources[f].Properties["AutoPublishAlias"]) {
			return true
		}
	}
	return false
}

// Every function is a program of ours, built by build.sh for the processor and under the name that the template says.
func TestFunctionsAreBuilt(t *testing.T) {
	tpl := load(t, "template.yaml")
	script, err := os.ReadFile("build.sh")
	if err != nil {
		t.Fatal(err)
	}
	listed := regexp.MustCompile(`(?m)^functions=\(([^)]*)\)`).FindSubmatch(script)
	if listed == nil {
		t.Fatal("build.sh lists no functions")
	}
	globals := object(object(object(tpl.whole)["Globals"])["Function"])
	if text(globals["Runtime"]) != "provided.al2023" || text(globals["Handler"]) != "bootstrap" || fmt.Sprint(globals["Architectures"]) != "[arm64]" ||
		!bytes.Contains(script, []byte("GOARCH=arm64")) {
		t.Errorf("runtime, handler and processor are %v", globals)
	}
	var named []string
	for _, f := range tpl.ofType("AWS::Serverless::Function") {
		uri := text(tpl.Resources[f].Properties["CodeUri"])
		program, ok := strings.CutPrefix(strings.TrimSuffix(uri, ".zip"), "../dist/")
		if !ok {
			t.Errorf("%s: CodeUri %s is nothing that build.sh makes", f, uri)
		}
		pkgs, err := parser.ParseFile(token.NewFileSet(), filepath.Join("../functions", program, "main.go"), nil, parser.PackageClauseOnly)
		if err != nil || pkgs.Name.Name != "main" {
			t.Errorf("%s: functions/%s is no program: %v", f, program, err)
		}
		named = append(named, program)
	}
	if built := strings.Fields(string(listed[1])); !slices.Equal(named, built) {
		t.Errorf("the template has %v, build.sh builds %v", named, built)
	}
}

// The program reads the environment that the template sets, and the template sets what the program reads.
func TestEnvironment(t *testing.T) {
	tpl := load(t, "template.yaml")
	own := regexp.MustCompile(`"(GRAMLAW_[A-Z_]+)"`)
	for _, f := range tpl.ofType("AWS::Serverless::Function") {
		p := tpl.Resources[f].Properties
		source, err := os.ReadFile(filepath.Join("../functions", strings.TrimSuffix(filepath.Base(text(p["CodeUri"])), ".zip"), "main.go"))
		if err != nil {
			t.Fatal(err)
		}
		set := object(object(p["Environment"])["Variables"])
		var reads []string
		for _, m := range own.FindAllSubmatch(source, -1) {
			reads = append(reads, string(m[1]))
			if _, ok := set[string(m[1])]; !ok {
				t.Errorf("%s reads %s and the template does not set it", f, m[1])
			}
		}
		for name := range set {
			if strings.HasPrefix(name, "GRAMLAW_") && !slices.Contains(reads, name) {
				t.Errorf("%s does not read %s", f, name)
			}
		}
	}
}

// The gateway routes what the service answers, and lets nobody in unknown but to /health.
func TestRoutes(t *testing.T) {
	tpl := load(t, "template.yaml")
	var routed []string
	for name, e := range object(tpl.Resources["Check"].Properties["Events"]) {
		p := object(object(e)["Properties"])
		path := text(p["Path"])
		routed = append(routed, path)
		if text(object(e)["Type"]) != "HttpApi" || text(p["Method"]) != "ANY" || fmt.Sprint(p["ApiId"]) != "map[Ref:Api]" {
			t.Errorf("%s is no route of the API for every method: %v", name, e)
		}
		if open := p["Auth"] != nil; open != (path == "/health") {
			t.Errorf("%s: authorisation %v", path, p["Auth"])
		}
	}
	want := web.Routes()
	slices.Sort(want)
	slices.Sort(routed)
	if !slices.Equal(routed, want) {
		t.Errorf("routes are %v, the service answers %v", routed, want)
	}
	auth := object(tpl.Resources["Api"].Properties["Auth"])
	jwt := object(object(auth["Authorizers"])[text(auth["DefaultAuthorizer"])])
	if jwt["JwtConfiguration"] == nil || text(jwt["IdentitySource"]) != "$request.header.Authorization" {
		t.Errorf("the default authoriser is %v", auth)
	}
	for _, u := range tpl.ofType("AWS::Lambda::Url") {
		if p := tpl.Resources[u].Properties; text(p["AuthType"]) != "AWS_IAM" || text(p["InvokeMode"]) != "BUFFERED" {
			t.Errorf("%s: %v", u, p)
		}
	}
}

// What is kept is encrypted and not for ever; what runs is bounded.
func TestBoundsAndEncryption(t *testing.T) {
	tpl := load(t, "template.yaml")
	for kind, wants := range map[string][]string{
		"AWS::Logs::LogGroup":       {"KmsKeyId", "RetentionInDays"},
		"AWS::S3::Bucket":           {"BucketEncryption", "PublicAccessBlockConfiguration", "VersioningConfiguration", "OwnershipControls"},
		"AWS::SNS::Topic":           {"KmsMasterKeyId"},
		"AWS::Serverless::Function": {"KmsKeyArn", "ReservedConcurrentExecutions", "Timeout", "MemorySize", "Role", "LoggingConfig"},
		"AWS::Serverless::HttpApi":  {"AccessLogSettings", "DefaultRouteSettings", "Auth"},
	} {
		names := tpl.ofType(kind)
		if len(names) == 0 {
			t.Errorf("there is no %s", kind)
		}
		for _, name := range names {
			for _, w := range wants {
				if tpl.Resources[name].Properties[w] == nil {
					t.Errorf("%s has no %s", name, w)
				}
			}
		}
	}
	route := object(tpl.Resources["Api"].Properties["DefaultRouteSettings"])
	if route["ThrottlingRateLimit"] == nil || route["ThrottlingBurstLimit"] == nil {
		t.Errorf("requests are not throttled: %v", route)
	}
	for _, v := range object(object(tpl.Resources["RulesBucket"].Properties)["PublicAccessBlockConfiguration"]) {
		if v != true {
			t.Errorf("the rules bucket is not closed: %v", tpl.Resources["RulesBucket"].Properties)
		}
	}
}

// No role may do everything, or anything to everything, but for two actions that know no resources.
func TestLeastPrivilege(t *testing.T) {
	tpl := load(t, "template.yaml")
	for _, name := range tpl.ofType("AWS::IAM::Role") {
		for _, p := range list(tpl.Resources[name].Properties["Policies"]) {
			for _, s := range list(object(object(p)["PolicyDocument"])["Statement"]) {
				actions, resources := texts(object(s)["Action"]), texts(object(s)["Resource"])
				for _, a := range actions {
					if strings.Contains(a, "*") {
						t.Errorf("%s may %s", name, a)
					}
					if slices.Contains(resources, "*") && !strings.HasPrefix(a, "xray:Put") {
						t.Errorf("%s may %s everything", name, a)
					}
				}
			}
		}
	}
}
