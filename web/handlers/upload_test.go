package handlers

import (
	"bytes"
	"fmt"
	"mime"
	"mime/multipart"
	"net/textproto"
	"strings"
	"testing"

	"legwright/internal/perf/sheet"
)

const powerImport = "/projects/1/variants/a/import?table=powerplant.values.engine.power_curve"

// upload sends a file as a browser does.
func (v *visitor) upload(address, name string, content []byte, fields ...string) {
	v.t.Helper()
	var b bytes.Buffer
	w := multipart.NewWriter(&b)
	for i := 0; i < len(fields); i += 2 {
		if err := w.WriteField(fields[i], fields[i+1]); err != nil {
			v.t.Fatal(err)
		}
	}
	part, err := w.CreatePart(textproto.MIMEHeader{"Content-Disposition": {fmt.Sprintf(`form-data; name="file"; filename="%s"`, name)}, "Content-Type": {"application/octet-stream"}})
	if err != nil {
		v.t.Fatal(err)
	}
	if _, err := part.Write(content); err != nil {
		v.t.Fatal(err)
	}
	if err := w.Close(); err != nil {
		v.t.Fatal(err)
	}
	v.send("POST", address, &b, "Content-Type", w.FormDataContentType())
}

// TestOriginalComesBack: the bytes of a file are kept whatever they are, and downloaded as a file of its name.
func TestOriginalComesBack(t *testing.T) {
	content := []byte("\xff\xfer\x00p\x00m\x00;\x00P\x00\r\x00\n\x001\x00;\x002\x00")
	for sent, name := range map[string]string{"curve.csv": "curve.csv", `C:\tests\für später.csv`: "für später.csv", "../../etc/passwd": "passwd", "a\tb.csv": "ab.csv", "..": "sheet.csv",
		`x\".csv`: `x".csv`, "<script>.csv": "<script>.csv", strings.Repeat("n", 300) + ".csv": strings.Repeat("n", 120)} {
		v := visit(t)
		v.upload(powerImport, sent, content, "text", " ")
		if v.reply.Code != 303 {
			t.Errorf("%s: status %d", sent, v.reply.Code)
			continue
		}
		v.follow()
		if err := checkPage(v.reply.Body.String()); err != nil || !strings.Contains(text(one(v.page, "h1")), name) {
			t.Errorf("%s: %q, %v", sent, text(one(v.page, "h1")), err)
		}
		v.get("/projects/1/originals/1")
		h := v.reply.Header()
		kind, params, err := mime.ParseMediaType(h.Get("Content-Disposition"))
		if err != nil || kind != "attachment" || params["filename"] != strings.NewReplacer("<", "_", ">", "_", `"`, "_").Replace(name) || h.Get("Content-Type") != "text/csv" || h.Get("X-Content-Type-Options") != "nosniff" {
			t.Errorf("%s: headers %v, %v", sent, h, err)
		}
		if !bytes.Equal(v.reply.Body.Bytes(), content) {
			t.Errorf("%s: %q came back", sent, v.reply.Body)
		}
	}
}

// TestUploadRefuses: a hostile or mistaken upload is answered with the page and a reason, and nothing is kept.
func TestUploadRefuses(t *testing.T) {
	large := bytes.Repeat([]byte("1;2\n"), sheet.MaxBytes/4+1)
	for name, c := range map[string]struct {
		content []byte
		text    string
		code    int
		says    string
	}{
		"workbook":        {[]byte("PK\x03\x04 and so on"), "", 422, "save the sheet as CSV"},
		"zero bytes":      {[]byte("1;2\x00"), "", 422, "zero bytes"},
		"nothing":         {nil, "", 422, "there is nothing in it"},
		"file and text":   {[]byte("1;2\n"), "3;4", 422, "Choose one"},
		"too large":       {large, "", 422, "larger than what is read"},
		"text too large":  {[]byte("1;2\n"), string(large), 422, "larger than what is read"},
		"beyond the door": {make([]byte, maxUpload+1), "", 413, "too large"},
	} {
		v := visit(t)
		v.upload(powerImport, "x.csv", c.content, "text", c.text)
		body := v.reply.Body.String()
		if v.reply.Code != c.code || !strings.Contains(body, c.says) {
			t.Errorf("%s: status %d, %.200s", name, v.reply.Code, body)
		}
		if c.code == 422 {
			if err := checkPage(body); err != nil {
				t.Errorf("%s: %v", name, err)
			}
			if len(c.text) < 100 && value(one(v.page, "#import-text")) != c.text {
				t.Errorf("%s: the text became %q", name, value(one(v.page, "#import-text")))
			}
		}
		if list, err := v.db.Originals(t.Context(), 1); err != nil || len(list) > 0 {
			t.Errorf("%s: kept %+v, %v", name, list, err)
		}
		if v.log.Len() > 0 {
			t.Errorf("%s: the site logged %s", name, v.log)
		}
	}
	// Broken forms.
	for kind, body := range map[string]string{"multipart/form-data; boundary=x": "--x\r\nno end", "multipart/form-data": "", "multipart/form-data; boundary=y": strings.Repeat("--y\r\nContent-Disposition: form-data; name=\"a\"\r\n\r\n1\r\n", 20) + "--y--"} {
		v := visit(t)
		v.send("POST", powerImport, strings.NewReader(body), "Content-Type", kind)
		if v.reply.Code != 400 || v.log.Len() > 0 {
			t.Errorf("%s: status %d, logged %s", kind, v.reply.Code, v.log)
		}
	}
}

// TestUploadFromElsewhere: another site's page cannot send a file, nor fetch one.
func TestUploadFromElsewhere(t *testing.T) {
	v := visit(t)
	v.upload(powerImport, "x.csv", []byte("rpm;P\n1;2\n"))
	for _, try := range []func(){
		func() {
			v.send("POST", powerImport, strings.NewReader("text=1"), "Content-Type", "text/plain", "Sec-Fetch-Site", "cross-site", "Origin", "http://elsewhere.example")
		},
		func() {
			v.get("/projects/1/originals/1", "Sec-Fetch-Site", "cross-site", "Sec-Fetch-Mode", "no-cors", "Sec-Fetch-Dest", "script")
		},
	} {
		try()
		if v.reply.Code != 403 {
			t.Errorf("%s: status %d", v.at, v.reply.Code)
		}
	}
}

// TestMappingIsOnlyWhatItSays: settings that no form sends change nothing and break nothing.
func TestMappingIsOnlyWhatItSays(t *testing.T) {
	v := visit(t)
	v.upload(powerImport, "x.csv", []byte("rpm;P [kW]\n1800;40\n2800;62\n"))
	v.follow()
	at := v.at.String()
	for _, q := range []string{"&delimiter=x&decimal=x&heads=x", "&block=7", "&block=all", "&family=9%3Dx", "&family=%40", "&shown=1&was=semicolon+++&column-power=99", "&shown=1&was=semicolon+++&column-power=-1",
		"&shown=1&was=semicolon+++&column-speed=1&column-power=1", "&shown=1&was=semicolon+++&column-speed=1&was-speed=1&unit-speed=%C2%B0C", "&heads=two", "&heads=none", "&delimiter=comma", "&delimiter=tab", "&delimiter=blanks&decimal=comma"} {
		v.get(at + q)
		if err := checkPage(v.reply.Body.String()); err != nil || v.reply.Code != 200 || v.log.Len() > 0 {
			t.Errorf("%s: status %d, %v, logged %s", q, v.reply.Code, err, v.log)
		}
	}
	v.get(at, "HX-Request", "true")
	if strings.Contains(v.reply.Body.String(), "<html") || one(v.page, "#import") == nil {
		t.Error("the page's script gets a whole page")
	}
	if h, _ := v.db.Head(t.Context(), 1); h.Number != 1 {
		t.Errorf("looking made revision %d", h.Number)
	}
}
